package web

import (
	"context"
	"errors"
	"math"
	"net/http"
	"os"
	"path/filepath"

	"fellreach/link/coverage"
	"fellreach/terrain/raster"

	"github.com/danielgtaylor/huma/v2"
	"github.com/danielgtaylor/huma/v2/sse"
	"github.com/paulmach/orb"
)

// A CoverBody asks for the coverage of a site of the plan's coverage list.
type CoverBody struct {
	Version string `json:"version,omitempty" maxLength:"64" doc:"version of the plan; that of the file when left out"`
	Site    string `json:"site" maxLength:"500" doc:"as the plan's coverage list names it"`
}

// A CoverJob is a coverage map in the making, or made.
type CoverJob struct {
	ID      string       `json:"id"`
	Version string       `json:"version" doc:"version of the plan that it maps"`
	Site    string       `json:"site"`
	State   string       `json:"state" enum:"running,finished,cancelled,failed"`
	Done    int          `json:"done" doc:"radials"`
	Total   int          `json:"total" doc:"radials; 0 while the ground is read"`
	Problem string       `json:"problem,omitempty" doc:"why it failed"`
	Result  *CoverResult `json:"result,omitempty"`
}

// CoverProgress tells how far a job has come.
type CoverProgress struct {
	Done  int `json:"done" doc:"radials"`
	Total int `json:"total"`
}

// A CoverResult is a map that is made: what cover.json says of it, and how to show it.
type CoverResult struct {
	coverage.SiteReport
	Tiles   string        `json:"tiles" doc:"address of the margin's tiles: PNG, clear where there is no coverage"`
	MinZoom int           `json:"min_zoom"`
	MaxZoom int           `json:"max_zoom"`
	West    float64       `json:"west"`
	South   float64       `json:"south"`
	East    float64       `json:"east"`
	North   float64       `json:"north"`
	Legend  []LegendColor `json:"legend" doc:"colours of the tiles, growing"`
}

// A LegendColor is the colour of the margins from one on.
type LegendColor struct {
	FromDB float64 `json:"from_db"`
	Color  string  `json:"color" example:"#002051"`
}

// A CoverValue is what a map holds at a place; null where it holds nothing.
type CoverValue struct {
	MarginDB *float64 `json:"margin_db"`
	LossDB   *float64 `json:"loss_db" doc:"basic transmission loss for half of time and locations"`
}

// A JobInput names a job.
type JobInput struct {
	ID string `path:"id" maxLength:"20" example:"0011223344556677"`
}

// A valueInput asks for the value of a job's map at a place.
type valueInput struct {
	JobInput
	Lon float64 `query:"lon" required:"true" minimum:"-180" maximum:"180" example:"-20.1"`
	Lat float64 `query:"lat" required:"true" minimum:"-90" maximum:"90" example:"47.5"`
}

func (s *Server) registerCover(api huma.API) {
	answer(api, sendOperation("startCoverage", http.MethodPost, "/api/coverage", "Start to map the coverage of a site", CoverBody{Site: "Hallin Top/gauges"}), s.startCover)
	answer(api, readOperation("readCoverage", "/api/coverage/{id}", "How far a coverage job has come, and its result"), func(_ context.Context, in *JobInput) (CoverJob, error) {
		job, err := s.jobs.find(in.ID)
		if err != nil {
			return CoverJob{}, err
		}
		now, _ := s.jobs.look(job)
		return now, nil
	})
	stop := readOperation("cancelCoverage", "/api/coverage/{id}", "Cancel a coverage job that is running")
	stop.Method = http.MethodDelete
	answer(api, stop, s.cancelCover)
	answer(api, readOperation("readCoverageValue", "/api/coverage/{id}/value", "What a coverage map holds at a place"), s.readCoverValue)
	huma.Register(api, fileOperation("readCoverageBands", "/api/coverage/{id}/bands", "The bands of a coverage map as polygons", "geojson"), s.coverBands)
	huma.Register(api, fileOperation("readCoverageMargin", "/api/coverage/{id}/margin.tif", "The margin of a coverage map as a raster", "tif"), func(_ context.Context, in *JobInput) (*file, error) {
		return s.coverRaster(in.ID, "margin", func(r *coverResult) []float32 { return r.marginDB })
	})
	huma.Register(api, fileOperation("readCoverageLoss", "/api/coverage/{id}/loss.tif", "The basic transmission loss of a coverage map as a raster", "tif"), func(_ context.Context, in *JobInput) (*file, error) {
		return s.coverRaster(in.ID, "loss", func(r *coverResult) []float32 { return r.lossDB })
	})
	events := readOperation("watchCoverage", "/api/coverage/{id}/events", "Watch a coverage job until it ends")
	events.Middlewares = huma.Middlewares{func(ctx huma.Context, next func(huma.Context)) {
		if _, err := s.jobs.find(ctx.Param("id")); err != nil {
			_ = huma.WriteErr(api, ctx, http.StatusNotFound, err.Error())
			return
		}
		next(ctx)
	}}
	sse.Register(api, events, map[string]any{"progress": CoverProgress{}, "finished": CoverJob{}}, s.watchCover)
}

func (s *Server) startCover(_ context.Context, in *struct{ Body CoverBody }) (CoverJob, error) {
	v, err := s.shelf.take(in.Body.Version)
	if err != nil {
		return CoverJob{}, err
	}
	release := func() { s.shelf.release(v) }
	sites, err := v.network.CoverageSites(in.Body.Site)
	if err == nil && in.Body.Site == "" {
		err = errors.New("name a site of the plan's coverage list")
	}
	if err != nil {
		release()
		return CoverJob{}, err
	}
	job, err := s.jobs.start(v, sites[0], release)
	if err != nil {
		release()
		return CoverJob{}, err
	}
	now, _ := s.jobs.look(job)
	return now, nil
}

func (s *Server) cancelCover(ctx context.Context, in *JobInput) (CoverJob, error) {
	job, err := s.jobs.find(in.ID)
	if err == nil {
		err = s.jobs.stop(ctx, job)
	}
	if err != nil {
		return CoverJob{}, err
	}
	now, _ := s.jobs.look(job)
	return now, nil
}

// watchCover sends a job's progress, and at its end the job.
func (s *Server) watchCover(ctx context.Context, in *JobInput, send sse.Sender) {
	job, err := s.jobs.find(in.ID)
	for err == nil {
		now, changed := s.jobs.look(job)
		if now.State != jobRunning {
			_ = send.Data(now)
			return
		}
		err = send.Data(CoverProgress{now.Done, now.Total})
		select {
		case <-changed:
		case <-ctx.Done():
			return
		}
	}
}

// look returns a job as it is now, and a channel that is closed when that changes.
func (c *coverJobs) look(job *coverJob) (CoverJob, <-chan struct{}) {
	c.mutex.Lock()
	defer c.mutex.Unlock()
	out := CoverJob{ID: job.id, Version: job.version, Site: job.site.Name, State: job.state, Done: job.done, Total: job.total}
	if job.err != nil {
		out.Problem = job.err.Error()
	}
	if job.result != nil {
		out.Result = job.result.answer(job.id)
	}
	return out, job.changed
}

func (r *coverResult) answer(id string) *CoverResult {
	out := &CoverResult{SiteReport: r.report, Tiles: "/tiles/coverage/" + id + "/{z}/{x}/{y}.png", West: r.bounds.Left(), South: r.bounds.Bottom(), East: r.bounds.Right(), North: r.bounds.Top()}
	out.MaxZoom = min(max(int(math.Ceil(math.Log2(pixelSizeM(0, r.bounds.Center().Lat())/r.frame.CellM))), 0), maxZoom)
	for i, c := range marginColors {
		out.Legend = append(out.Legend, LegendColor{float64(i) * marginStepDB, c.hex()})
	}
	return out
}

// resultOf returns the result of a job that has finished.
func (s *Server) resultOf(id string) (*coverResult, error) {
	job, err := s.jobs.find(id)
	if err != nil {
		return nil, err
	}
	s.jobs.mutex.Lock()
	defer s.jobs.mutex.Unlock()
	if job.result == nil {
		return nil, problem(http.StatusConflict, "coverage job "+id+" is "+job.state+": it has no map")
	}
	return job.result, nil
}

func (s *Server) readCoverValue(_ context.Context, in *valueInput) (CoverValue, error) {
	r, err := s.resultOf(in.ID)
	if err != nil {
		return CoverValue{}, err
	}
	cells, err := r.frame.Cells(raster.Picture{Cols: 2, Rows: 2, Place: func(_, _ float64) orb.Point { return orb.Point{in.Lon, in.Lat} }})
	if err != nil {
		return CoverValue{}, err
	}
	at, ok := r.cell(cells.At(0, 0))
	if !ok {
		return CoverValue{}, nil
	}
	return CoverValue{known(r.marginDB[at]), known(r.lossDB[at])}, nil
}

// cell returns the index of the cell that a position of the frame lies in.
func (r *coverResult) cell(col, row float64) (int, bool) {
	c, l := math.Floor(col+0.5), math.Floor(row+0.5)
	if !(c >= 0 && l >= 0 && c < float64(r.frame.Cols) && l < float64(r.frame.Rows)) {
		return 0, false
	}
	return int(l)*r.frame.Cols + int(c), true
}

func known(v float32) *float64 {
	if v != v {
		return nil
	}
	x := float64(v)
	return &x
}

// coverRaster writes a layer of a finished map as the cover command does, by way of a folder of its
// own.
func (s *Server) coverRaster(id, layer string, cells func(*coverResult) []float32) (*file, error) {
	r, err := s.resultOf(id)
	if err != nil {
		return nil, asProblem(err)
	}
	folder, err := os.MkdirTemp("", "fellreach-")
	if err != nil {
		return nil, asProblem(err)
	}
	defer os.RemoveAll(folder)
	name := layer + "-" + plainName(r.report.Site) + ".tif"
	path := filepath.Join(folder, name)
	if err := raster.WriteCOG(path, raster.COG{Frame: r.frame, Cells: cells(r), Unit: "dB", About: layer + " of " + r.report.Site, Small: true}); err != nil {
		return nil, asProblem(err)
	}
	data, err := os.ReadFile(path)
	if err != nil {
		return nil, asProblem(err)
	}
	return &file{mediaTypes["tif"], "attachment; filename=\"" + name + "\"", data}, nil
}

func (s *Server) coverBands(_ context.Context, in *JobInput) (*file, error) {
	r, err := s.resultOf(in.ID)
	if err != nil {
		return nil, asProblem(err)
	}
	return &file{mediaTypes["geojson"], "attachment; filename=\"bands-" + plainName(r.report.Site) + ".geojson\"", r.bands}, nil
}
