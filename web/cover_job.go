package web

import (
	"bytes"
	"context"
	"crypto/rand"
	"encoding/hex"
	"errors"
	"fmt"
	"net/http"
	"sync"

	"fellreach/link/coverage"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// Limits of coverage jobs. A larger map is for the cover command.
const (
	maxRunningJobs = 2
	maxKeptJobs    = 6
	maxJobCells    = 20_000_000
)

// The states of a job.
const (
	jobRunning   = "running"
	jobFinished  = "finished"
	jobCancelled = "cancelled"
	jobFailed    = "failed"
)

// A coverJob is a coverage map in the making, or made.
type coverJob struct {
	id, version string
	site        coverage.Site
	cancel      context.CancelFunc
	changed     chan struct{} // closed and made anew whenever the rest changes; guarded by the jobs

	state       string
	done, total int // radials
	err         error
	result      *coverResult
}

// A coverResult is what is kept of a map.
type coverResult struct {
	report           coverage.SiteReport
	frame            *raster.Frame
	bounds           orb.Bound
	marginDB, lossDB []float32
	bands            []byte // GeoJSON
}

// coverJobs are the coverage jobs of a server, the newest at the end.
type coverJobs struct {
	mutex  sync.Mutex
	jobs   []*coverJob
	atWork sync.WaitGroup
}

// start begins a job on a version that is in use; release is called when the job has ended.
func (c *coverJobs) start(v *version, site coverage.Site, release func()) (*coverJob, error) {
	side := 2 * site.Task.RangeM / site.Task.CellM
	if side*side > maxJobCells {
		return nil, fmt.Errorf("a range of %g km in cells of %g m makes %.0f million cells, over %d million: take larger cells, or run fellreach cover", site.Task.RangeM/1000, site.Task.CellM, side*side/1e6, maxJobCells/1_000_000)
	}
	c.mutex.Lock()
	defer c.mutex.Unlock()
	running := 0
	for _, job := range c.jobs {
		if job.state == jobRunning {
			running++
		}
	}
	if running >= maxRunningJobs {
		return nil, problem(http.StatusTooManyRequests, fmt.Sprintf("%d coverage jobs run already: wait for one, or cancel it", running))
	}
	ctx, cancel := context.WithCancel(context.Background())
	job := &coverJob{id: newJobID(), version: v.id, site: site, cancel: cancel, changed: make(chan struct{}), state: jobRunning}
	c.keep(job)
	c.atWork.Go(func() {
		defer release()
		defer cancel()
		result, err := job.run(ctx, v, func(done, total int) { c.change(job, func() { job.done, job.total = max(job.done, done), total }) })
		c.change(job, func() { job.end(ctx, result, err) })
	})
	return job, nil
}

// newJobID is a number that never comes again, since browsers keep the tiles of a map for good.
func newJobID() string {
	var number [8]byte
	_, _ = rand.Read(number[:]) // never fails
	return hex.EncodeToString(number[:])
}

// keep adds a job and forgets the oldest that has ended where they are too many. The mutex is held.
func (c *coverJobs) keep(job *coverJob) {
	c.jobs = append(c.jobs, job)
	for i := 0; len(c.jobs) > maxKeptJobs && i < len(c.jobs); {
		if c.jobs[i].state == jobRunning {
			i++
			continue
		}
		c.jobs = append(c.jobs[:i:i], c.jobs[i+1:]...)
	}
}

// change changes a job and wakes those who watch it.
func (c *coverJobs) change(job *coverJob, change func()) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	change()
	close(job.changed)
	job.changed = make(chan struct{})
}

// find returns a job, or a problem.
func (c *coverJobs) find(id string) (*coverJob, error) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	for _, job := range c.jobs {
		if job.id == id {
			return job, nil
		}
	}
	return nil, problem(http.StatusNotFound, fmt.Sprintf("there is no coverage job %.20q (any longer)", id))
}

// stop cancels a running job and waits until it has ended.
func (c *coverJobs) stop(ctx context.Context, job *coverJob) error {
	c.mutex.Lock()
	state := job.state
	c.mutex.Unlock()
	if state != jobRunning {
		return problem(http.StatusConflict, fmt.Sprintf("coverage job %s is %s already: there is nothing to cancel", job.id, state))
	}
	job.cancel()
	for {
		answer, changed := c.look(job)
		if answer.State != jobRunning {
			return nil
		}
		select {
		case <-changed:
		case <-ctx.Done():
			return ctx.Err()
		}
	}
}

// close cancels all jobs and waits for them.
func (c *coverJobs) close() {
	c.mutex.Lock()
	for _, job := range c.jobs {
		job.cancel()
	}
	c.mutex.Unlock()
	c.atWork.Wait()
}

// run computes a job's map.
func (j *coverJob) run(ctx context.Context, v *version, progress func(done, total int)) (*coverResult, error) {
	m, err := coverage.Compute(ctx, v.network.Ground, j.site.Task, coverage.Layers{Loss: true, Margin: true}, progress)
	if err != nil {
		return nil, err
	}
	r := &coverResult{report: j.site.Report(m), frame: m.Frame, marginDB: m.MarginDB, lossDB: m.LossDB}
	if r.bounds, err = m.Frame.Bounds(); err != nil {
		return nil, err
	}
	var b bytes.Buffer
	err = j.site.WriteBands(&b, m)
	r.bands = b.Bytes()
	return r, err
}

// end notes how a job ended.
func (j *coverJob) end(ctx context.Context, result *coverResult, err error) {
	switch {
	case err == nil:
		j.state, j.result = jobFinished, result
	case ctx.Err() != nil && errors.Is(err, context.Canceled):
		j.state = jobCancelled
	default:
		j.state, j.err = jobFailed, err
	}
}
