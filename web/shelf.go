package web

import (
	"fmt"
	"net/http"
	"os"
	"path/filepath"
	"slices"
	"sync"

	"fellreach/link/plan"

	"github.com/google/renameio/v2"
)

// Limits of the versions that are held: the least recently asked one goes first.
const (
	maxVersions     = 24
	maxVersionBytes = 16 << 20 // of their texts
)

// A shelf holds versions of the plan: the last good one of its file, and those tried.
type shelf struct {
	path string

	mutex sync.Mutex
	held  []*version // the one asked last at the end
	file  *version   // the last good one of the file
	files []string   // that the plan on disk names

	antennas generation
}

// openShelf reads the plan for the first time; it must be good.
func openShelf(path string) (*shelf, error) {
	s := &shelf{path: path}
	v, err := s.current()
	if err != nil {
		return nil, err
	}
	s.release(v)
	return s, nil
}

// take returns a version for the time of a request, by its id or, where that is empty, the one in
// the file now. The caller releases it.
func (s *shelf) take(id string) (*version, error) {
	if id == "" {
		return s.current()
	}
	s.mutex.Lock()
	defer s.mutex.Unlock()
	if v := s.find(id); v != nil {
		v.users++
		return v, nil
	}
	return nil, problem(http.StatusNotFound, fmt.Sprintf("version %.40q of the plan is not held (any longer): read the plan, or try the changes, again", id))
}

// find returns a version on the shelf, as the one asked last, or nil. The mutex is held.
func (s *shelf) find(id string) *version {
	i := slices.IndexFunc(s.held, func(v *version) bool { return v.id == id })
	if i < 0 {
		return nil
	}
	v := s.held[i]
	s.held = append(slices.Delete(s.held, i, i+1), v)
	return v
}

// takeGround returns a version that stands on a ground, as take does.
func (s *shelf) takeGround(id string) (*version, error) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	for _, v := range s.held {
		if v.ground.id == id {
			v.users++
			return v, nil
		}
	}
	return nil, problem(http.StatusNotFound, fmt.Sprintf("ground %.40q is not held (any longer): ask /api/ground for the address of its tiles", id))
}

// current returns the version in the file now, reading it anew where it has changed. A file that is
// broken is an error; the last good version stays on the shelf.
func (s *shelf) current() (*version, error) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	if err := s.refresh(); err != nil {
		return nil, err
	}
	s.file.users++
	return s.file, nil
}

// lastGood returns the file's last good version, and what is wrong with the file now.
func (s *shelf) lastGood() (v *version, broken error) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	broken = s.refresh()
	s.file.users++
	return s.file, broken
}

// refresh reads the file and, where its text is new, opens it. The mutex is held.
func (s *shelf) refresh() error {
	text, err := readPlan(s.path)
	if err != nil {
		return err
	}
	id := idOf(text)
	if s.file != nil && s.file.id == id {
		return nil
	}
	v := s.find(id)
	if v == nil {
		p, err := plan.Parse(s.path, text)
		if err != nil {
			return err
		}
		if v, err = s.open(p, text, s.file); err != nil {
			return err
		}
		s.put(v)
	}
	s.file, s.files = v, nil
	for _, f := range v.plan.Files() {
		s.files = append(s.files, f.Path)
	}
	return nil
}

func readPlan(path string) ([]byte, error) {
	info, err := os.Stat(path)
	if err != nil {
		return nil, err
	}
	if info.Size() > maxPlanBytes {
		return nil, fmt.Errorf("%s has %d bytes, over %d: it is no plan", path, info.Size(), maxPlanBytes)
	}
	return os.ReadFile(path)
}

// open opens a plan that has been parsed, on the ground of the version before where it can.
func (s *shelf) open(p *plan.Plan, text []byte, before *version) (*version, error) {
	open := p.Open
	if before != nil {
		open = func() (*plan.Network, error) { return p.OpenAfter(before.network, s.antennas.last()) }
	}
	network, err := open()
	if err != nil {
		return nil, err
	}
	v := &version{id: idOf(text), text: text, plan: p, network: network}
	s.antennas.add(v.network)
	if before != nil && v.network.SharesGround(before.network) {
		v.ground = before.ground
	} else {
		v.ground = newGround(v.network)
	}
	return v, nil
}

// try opens a text of a client's beside the version it was made from, and returns it as take does.
// It may not name files that the plan on disk does not.
func (s *shelf) try(text []byte, from *version) (*version, error) {
	id := idOf(text)
	if v, err := s.take(id); err == nil {
		return v, nil
	}
	p, err := s.parse(text)
	if err != nil {
		return nil, err
	}
	v, err := s.open(p, text, from)
	if err != nil {
		return nil, err
	}
	s.mutex.Lock()
	defer s.mutex.Unlock()
	if twin := s.find(id); twin != nil { // tried twice at once
		if v.ground != from.ground {
			v.network.Close()
		}
		v = twin
	} else {
		s.put(v)
	}
	v.users++
	return v, nil
}

// parse reads a client's text and looks at the files that it names.
func (s *shelf) parse(text []byte) (*plan.Plan, error) {
	p, err := plan.Parse(s.path, text)
	if err != nil {
		return nil, err
	}
	s.mutex.Lock()
	defer s.mutex.Unlock()
	return p, p.NamesOnly(s.files)
}

// save puts a text in the place of the file, whole, if the file still holds the version that the
// client read. The text has been tried.
func (s *shelf) save(text []byte, read string) error {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	before, err := readPlan(s.path)
	if err != nil {
		return err
	}
	if now := idOf(before); now != read {
		return problem(http.StatusConflict, fmt.Sprintf("the plan's file has changed since version %.40q was read; it holds %s now: read it again and bring the changes together", read, now))
	}
	path, err := filepath.EvalSymlinks(s.path)
	if err != nil {
		return err
	}
	if err := renameio.WriteFile(path, text, 0o644, renameio.WithExistingPermissions()); err != nil {
		return problem(http.StatusInternalServerError, err.Error())
	}
	return s.refresh()
}

// put adds a version to the shelf and drops those that are too many. The mutex is held.
func (s *shelf) put(v *version) {
	v.ground.users++
	s.held = append(s.held, v)
	bytes := 0
	for i := len(s.held) - 1; i >= 0; i-- {
		bytes += len(s.held[i].text)
		old := s.held[i]
		if old != v && old != s.file && (len(s.held)-i > maxVersions || bytes > maxVersionBytes) {
			s.held = slices.Delete(s.held, i, i+1)
			old.dropped = true
			old.leave()
		}
	}
}

// release ends a request's use of a version.
func (s *shelf) release(v *version) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	v.users--
	v.leave()
}

// leave closes the ground when the last of its versions has gone. The shelf's mutex is held.
func (v *version) leave() {
	if !v.dropped || v.users > 0 {
		return
	}
	if v.ground.users--; v.ground.users == 0 {
		v.ground.network.Close()
	}
}

// close closes all grounds. No request may be at work any more.
func (s *shelf) close() {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	for _, v := range s.held {
		v.dropped = true
		v.leave()
	}
	s.held = nil
}
