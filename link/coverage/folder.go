package coverage

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"fellreach/terrain/raster"

	"github.com/google/renameio/v2"
)

// A folder is where the results go. Files appear whole, or stay as they were.
type folder struct {
	dir   string
	small bool // compress for size
}

// stateDir holds, inside a folder, what a later run needs to know of the sites that are done.
const stateDir = ".cover"

// openFolder makes the folder if it is not there and makes sure that it can be written.
func openFolder(dir string, small bool) (folder, error) {
	f := folder{dir, small}
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return f, err
	}
	probe, err := os.CreateTemp(dir, ".probe*")
	if err != nil {
		return f, fmt.Errorf("%s cannot be written: %w", dir, err)
	}
	probe.Close()
	return f, os.Remove(probe.Name())
}

func (f folder) path(name string) string { return filepath.Join(f.dir, name) }

// has says whether all files are there.
func (f folder) has(names []string) bool {
	for _, name := range names {
		if _, err := os.Stat(f.path(name)); err != nil {
			return false
		}
	}
	return true
}

func (f folder) writeMap(name string, frame *raster.Frame, cells []float32, unit, about string) error {
	return raster.WriteCOG(f.path(name), raster.COG{Frame: frame, Cells: cells, Unit: unit, About: about, Small: f.small})
}

func (f folder) write(name string, fill func(io.Writer) error) (err error) {
	file, err := renameio.NewPendingFile(f.path(name), renameio.WithPermissions(0o644))
	if err != nil {
		return err
	}
	defer file.Cleanup()
	if err := fill(file); err != nil {
		return fmt.Errorf("writing %s: %w", f.path(name), err)
	}
	return file.CloseAtomicallyReplace()
}

func (f folder) writeJSON(name string, value any) error {
	return f.write(name, func(w io.Writer) error {
		encoder := json.NewEncoder(w)
		encoder.SetIndent("", "  ")
		encoder.SetEscapeHTML(false)
		return encoder.Encode(value)
	})
}

// A siteState is what is kept of a site that is done.
type siteState struct {
	Digest string     `json:"digest"`
	Report SiteReport `json:"report"`
}

// done returns the report of a site that was finished with the same digest, its files being there.
func (f folder) done(slug, digest string, names []string) (SiteReport, bool) {
	data, err := os.ReadFile(f.path(filepath.Join(stateDir, slug+".json")))
	if err != nil {
		return SiteReport{}, false
	}
	var state siteState
	decoder := json.NewDecoder(bytes.NewReader(data))
	if decoder.Decode(&state) != nil || state.Digest != digest || !f.has(names) {
		return SiteReport{}, false
	}
	return state.Report, true
}

func (f folder) setDone(slug, digest string, report SiteReport) error {
	if err := os.MkdirAll(f.path(stateDir), 0o755); err != nil {
		return err
	}
	return f.writeJSON(filepath.Join(stateDir, slug+".json"), siteState{digest, report})
}

// forget removes what is known of a site before its files are written anew.
func (f folder) forget(slug string) error {
	err := os.Remove(f.path(filepath.Join(stateDir, slug+".json")))
	if os.IsNotExist(err) {
		return nil
	}
	return err
}
