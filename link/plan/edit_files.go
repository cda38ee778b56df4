package plan

import (
	"fmt"
	"slices"
)

// A NamedFile is a file that a plan names, with the key that names it.
type NamedFile struct{ Field, Path string }

// Files lists the files that the plan names: rasters and patterns, by their paths as written.
func (p *Plan) Files() []NamedFile {
	var list []NamedFile
	for i, path := range p.Ground.Elevation.Files {
		list = append(list, NamedFile{fmt.Sprintf("ground.elevation.files[%d]", i), path})
	}
	if p.Ground.Cover != nil {
		list = append(list, NamedFile{"ground.cover.raster", p.Ground.Cover.Raster})
	}
	for name := range sorted(p.Antennas) {
		field := "antennas." + name
		switch spec := p.Antennas[name].Spec.(type) {
		case *PatternTable:
			list = append(list, NamedFile{field + ".pattern", spec.Pattern})
		case *PatternCuts:
			list = append(list, NamedFile{field + ".horizontal", spec.Horizontal}, NamedFile{field + ".vertical", spec.Vertical})
		}
	}
	return list
}

// NamesOnly returns an error, an [Errors], for every file that the plan names and that is not one of
// the allowed paths.
func (p *Plan) NamesOnly(allowed []string) error {
	c := &checker{Plan: p}
	for _, f := range p.Files() {
		if !slices.Contains(allowed, f.Path) {
			c.wrong(f.Field, fmt.Sprintf("names the file %.60q, which the plan on disk does not name", f.Path), "add new files to the plan in an editor")
		}
	}
	if len(c.errs) > 0 {
		return c.errs.sorted()
	}
	return nil
}
