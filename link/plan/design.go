package plan

import (
	"fmt"
	"io"
	"os"
	"sync"

	"fellreach/antenna"
)

// design turns an antenna of the plan into one that can be solved, reading its pattern files.
func (p *Plan) design(name string) (antenna.Design, error) {
	var d antenna.Design
	var err error
	switch spec := p.Antennas[name].Spec.(type) {
	case *Dipole:
		d, err = spec.design()
	case *Omni:
		d, err = antenna.Omni(float64(spec.Gain), spec.Port.port())
	case *Datasheet:
		d, err = antenna.Datasheet(antenna.Sheet{
			GainDBi: float64(spec.Gain), WidthHDeg: float64(spec.WidthH), WidthVDeg: float64(spec.WidthV), FrontToBackDB: float64(spec.FrontToBack),
		}, spec.Port.port())
	case *PatternTable:
		err = p.withFiles(func(files ...io.Reader) (err error) {
			d, err = antenna.Table(files[0], spec.Port.port())
			return err
		}, spec.Pattern)
	case *PatternCuts:
		err = p.withFiles(func(files ...io.Reader) (err error) {
			d, err = antenna.Cuts(files[0], files[1], float64(spec.Gain), spec.Port.port())
			return err
		}, spec.Horizontal, spec.Vertical)
	default:
		err = &hinted{fmt.Sprintf("a %s is not computed by this version", p.Antennas[name].Kind), "describe the antenna as a dipole, or by its maker's figures: omni, datasheet, table or cuts"}
	}
	d.Name, d.Kind = name, p.Antennas[name].Kind
	d.Solve = remembered(d.Solve)
	return d, err
}

func (spec *Dipole) design() (antenna.Design, error) {
	metal, err := antenna.MaterialNamed(spec.Material)
	if err != nil {
		return antenna.Design{}, err
	}
	feedAt := 0.5
	if spec.FeedAt != nil {
		feedAt = *spec.FeedAt
	}
	return antenna.Dipole(antenna.DipoleSpec{
		Length:    antenna.Length{M: spec.Length.M, Wavelengths: spec.Length.Wavelengths},
		FeedAt:    feedAt,
		DiameterM: float64(spec.Diameter),
		Material:  metal,
	})
}

func (p Port) port() antenna.Port {
	port := antenna.Port{ImpedanceOhm: float64(p.Impedance)}
	if p.VSWR != nil {
		port.VSWR = *p.VSWR
	}
	return port
}

// matchOf returns the transformer at an antenna, if the plan has one.
func matchOf(a Antenna) *Match {
	switch spec := a.Spec.(type) {
	case *Dipole:
		return spec.Match
	case *FoldedDipole:
		return spec.Match
	case *Yagi:
		return spec.Match
	case *Stack:
		return spec.Match
	case *Wires:
		return spec.Match
	}
	return nil
}

// withFiles opens files of the plan for as long as use runs. An error names the file.
func (p *Plan) withFiles(use func(...io.Reader) error, paths ...string) error {
	var readers []io.Reader
	for _, path := range paths {
		f, err := os.Open(p.resolvePath(path))
		if err != nil {
			return err
		}
		defer f.Close()
		readers = append(readers, f)
	}
	if err := use(readers...); err != nil {
		return fmt.Errorf("%s: %w", paths[0], err)
	}
	return nil
}

// remembered returns a solver that solves each setting once: many links share an antenna and a
// channel.
func remembered(solve func(antenna.Setting) (antenna.Solution, error)) func(antenna.Setting) (antenna.Solution, error) {
	type answer struct {
		once     sync.Once
		solution antenna.Solution
		err      error
	}
	var known sync.Map
	return func(s antenna.Setting) (antenna.Solution, error) {
		entry, _ := known.LoadOrStore(s, &answer{})
		a := entry.(*answer)
		a.once.Do(func() { a.solution, a.err = solve(s) })
		return a.solution, a.err
	}
}
