package plan

import (
	"fmt"
	"io"
	"os"

	"fellreach/antenna"
	"fellreach/antenna/wire"
)

// built is an antenna of the plan made ready: its design, and what hangs between it and the feeder.
type built struct {
	antenna.Design
	wires     *wire.Antenna // nil for an antenna of its maker's figures
	match     antenna.Match
	harnessDB float64 // of a stack
}

// built makes an antenna of the plan ready, reading its pattern files.
func (p *Plan) built(name string) (built, error) {
	var b built
	var err error
	switch spec := p.Antennas[name].Spec.(type) {
	case *Omni:
		b.Design, err = antenna.Omni(float64(spec.Gain), spec.Port.resolve())
	case *Datasheet:
		b.Design, err = antenna.Datasheet(antenna.Sheet{
			GainDBi: float64(spec.Gain), WidthHDeg: float64(spec.WidthH), WidthVDeg: float64(spec.WidthV), FrontToBackDB: float64(spec.FrontToBack),
		}, spec.Port.resolve())
	case *PatternTable:
		err = p.withFiles(func(files ...io.Reader) (err error) {
			b.Design, err = antenna.Table(files[0], spec.Port.resolve())
			return err
		}, spec.Pattern)
	case *PatternCuts:
		err = p.withFiles(func(files ...io.Reader) (err error) {
			b.Design, err = antenna.Cuts(files[0], files[1], float64(spec.Gain), spec.Port.resolve())
			return err
		}, spec.Horizontal, spec.Vertical)
	default:
		var w wire.Antenna
		if w, err = p.wires(name); err == nil {
			b.Design, b.wires = w.Design, &w
			b.match, b.harnessDB = p.match(name)
		}
	}
	if err != nil {
		return built{}, err
	}
	b.Name, b.Kind = name, p.Antennas[name].Kind
	return b, nil
}

// wires makes an antenna of wires.
func (p *Plan) wires(name string) (wire.Antenna, error) {
	switch spec := p.Antennas[name].Spec.(type) {
	case *Dipole:
		return spec.wires()
	case *FoldedDipole:
		metal, err := antenna.MaterialNamed(spec.Material)
		if err != nil {
			return wire.Antenna{}, err
		}
		return wire.FoldedDipole(wire.FoldedDipoleSpec{
			Length: spec.Length.resolve(), Spacing: antenna.Length{M: float64(spec.Spacing)}, DiameterM: float64(spec.Diameter), Material: metal,
		})
	case *Yagi:
		return spec.wires()
	case *Stack:
		of, err := p.wires(spec.Of)
		if err != nil {
			return wire.Antenna{}, err
		}
		return wire.Stack(wire.StackSpec{Of: of, Count: spec.Count, Spacing: spec.Spacing.resolve()})
	case *Wires:
		return spec.wires()
	}
	return wire.Antenna{}, &Refusal{fmt.Sprintf("%q is described by its maker's figures", name), "only antennas of wires can be stacked: dipole, folded-dipole, yagi or wires"}
}

func (spec *Dipole) wires() (wire.Antenna, error) {
	metal, err := antenna.MaterialNamed(spec.Material)
	if err != nil {
		return wire.Antenna{}, err
	}
	feedAt := 0.5
	if spec.FeedAt != nil {
		feedAt = *spec.FeedAt
	}
	return wire.Dipole(antenna.DipoleSpec{Length: spec.Length.resolve(), FeedAt: feedAt, DiameterM: float64(spec.Diameter), Material: metal})
}

func (spec *Yagi) wires() (wire.Antenna, error) {
	metal, err := antenna.MaterialNamed(spec.Material)
	if err != nil {
		return wire.Antenna{}, err
	}
	out := wire.YagiSpec{DiameterM: float64(spec.Diameter), Material: metal}
	for _, e := range spec.Elements {
		out.Elements = append(out.Elements, wire.Element{Length: e.Length.resolve(), At: Span(e.At).resolve(), Driven: e.Driven})
	}
	return wire.Yagi(out)
}

func (spec *Wires) wires() (wire.Antenna, error) {
	metal, err := antenna.MaterialNamed(spec.Material)
	if err != nil {
		return wire.Antenna{}, err
	}
	var wires []wire.Wire
	for _, w := range spec.Wires {
		wires = append(wires, wire.Wire{From: [3]float64(w.From), To: [3]float64(w.To), DiameterM: float64(w.Diameter), Material: metal})
	}
	var feeds []wire.Feed
	for _, f := range spec.Feeds {
		feeds = append(feeds, wire.Feed{Wire: f.Wire, At: f.At})
	}
	return wire.Wires(wires, feeds)
}

// resolve returns a length for the solver; the zero length means resonant.
func (r RodLength) resolve() antenna.Length { return r.Span.resolve() }

func (s Span) resolve() antenna.Length { return antenna.Length{M: s.M, Wavelengths: s.Wavelengths} }

func (p Port) resolve() antenna.Port {
	port := antenna.Port{ImpedanceOhm: float64(p.Impedance)}
	if p.VSWR != nil {
		port.VSWR = *p.VSWR
	}
	return port
}

// match returns the transformer at an antenna, and the loss of a stack's harness.
func (p *Plan) match(name string) (match antenna.Match, harnessDB float64) {
	var m *Match
	switch spec := p.Antennas[name].Spec.(type) {
	case *Dipole:
		m = spec.Match
	case *FoldedDipole:
		m = spec.Match
	case *Yagi:
		m = spec.Match
	case *Wires:
		m = spec.Match
	case *Stack:
		m = spec.Match
		if spec.Harness != nil {
			harnessDB = float64(*spec.Harness)
		}
	}
	if m == nil {
		return match, harnessDB
	}
	if m.Ratio != nil {
		match.Ratio = float64(*m.Ratio)
	}
	if m.Loss != nil {
		match.LossDB = float64(*m.Loss)
	}
	return match, harnessDB
}

// withFiles opens files of the plan for as long as use runs. An error names the files.
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
		return fmt.Errorf("%s: %w", orList(paths), err)
	}
	return nil
}
