package wire

import "fellreach/antenna"

// A Refinement is what becomes of an antenna when each wire has twice the segments, or as many as
// its thickness allows: none more, and no change, if Segments is that of the solution.
type Refinement struct {
	Segments     int
	ImpedanceOhm complex128
	ChangeOhm    complex128 // of the impedance
	ChangeDB     float64    // of the largest directivity
}

// Refine checks how far the solution in an installation has converged, by solving it once more on
// twice the segments. The change is the measure of what the division leaves open; on thick rods
// it has no limit, since a gap in a tube has none.
func (a Antenna) Refine(in antenna.Setting) (Refinement, error) {
	in, err := in.Checked()
	if err != nil {
		return Refinement{}, err
	}
	coarse, err := a.solve(in)
	if err != nil {
		return Refinement{}, err
	}
	c, err := a.cut(in)
	if err != nil {
		return Refinement{}, err
	}
	finer, err := c.at(in.FreqHz, in.DesignHz).finer(in)
	if err != nil {
		return Refinement{}, err
	}
	n, err := finer.Solve(in.FreqHz, in.DesignHz)
	if err != nil {
		return Refinement{}, err
	}
	fine, err := c.radiate(in, n)
	if err != nil {
		return Refinement{}, err
	}
	return Refinement{
		Segments:     n.Segments,
		ImpedanceOhm: fine.ImpedanceOhm,
		ChangeOhm:    fine.ImpedanceOhm - coarse.ImpedanceOhm,
		ChangeDB:     fine.Pattern.PeakDBi - coarse.Pattern.PeakDBi,
	}, nil
}

// finer returns the structure with twice the segments on each wire whose thickness allows more.
func (s Structure) finer(in antenna.Setting) (Structure, error) {
	p, err := s.prepare(in.FreqHz, in.DesignHz)
	if err != nil {
		return Structure{}, err
	}
	segments := p.mesh.segmentsOfWires(len(s.Wires))
	for i, w := range s.Wires {
		most := int(w.lengthM() / (leastRadii * w.radiusM()))
		segments[i] = max(segments[i], min(2*segments[i], most))
	}
	return s.divided(segments), nil
}
