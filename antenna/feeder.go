package antenna

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"
)

// A LossPoint is a feeder's matched loss in dB per metre at a frequency.
type LossPoint struct{ FreqHz, DBPerM float64 }

// A Feeder is a kind of line, as its maker states it: its characteristic impedance in ohm, its
// velocity as a fraction of that of light, and its matched loss at some frequencies, in any
// order. Source says where the figures are from.
type Feeder struct {
	Name           string
	ImpedanceOhm   float64
	VelocityFactor float64
	Loss           []LossPoint
	Source         string
}

// Check returns an error for every figure that cannot be a feeder's.
func (f Feeder) Check() error {
	errs := []error{
		within("impedance", f.ImpedanceOhm, 10, 1000, "ohm"),
		within("velocity_factor", f.VelocityFactor, 0.1, 1, ""),
	}
	if len(f.Loss) == 0 {
		errs = append(errs, errors.New("no loss is given: state it for one frequency at least"))
	}
	seen := map[float64]bool{}
	for _, point := range f.Loss {
		errs = append(errs,
			positive("frequency of a loss", point.FreqHz, "Hz"),
			within(fmt.Sprintf("loss at %s", megahertz(point.FreqHz)), point.DBPerM, 0, 10, "dB/m"))
		if seen[point.FreqHz] {
			errs = append(errs, fmt.Errorf("loss at %s is given twice", megahertz(point.FreqHz)))
		}
		seen[point.FreqHz] = true
	}
	if err := errors.Join(errs...); err != nil {
		return fmt.Errorf("feeder %s: %w", f.Name, err)
	}
	return nil
}

// LossDBPerM returns the matched loss in dB per metre at a frequency in Hz: linear in the square
// root of the frequency between the stated points, since the skin effect rules it. Beyond either
// end it goes on in proportion to the square root, with a note, up to a factor of two; further is
// an error.
func (f Feeder) LossDBPerM(freqHz float64) (lossDBPerM float64, note string, err error) {
	if err := f.Check(); err != nil {
		return 0, "", err
	}
	if err := positive("frequency", freqHz, "Hz"); err != nil {
		return 0, "", fmt.Errorf("feeder %s: %w", f.Name, err)
	}
	points := slices.SortedFunc(slices.Values(f.Loss), func(a, b LossPoint) int { return cmp.Compare(a.FreqHz, b.FreqHz) })
	lowest, highest := points[0], points[len(points)-1]
	if freqHz < lowest.FreqHz/2 || freqHz > highest.FreqHz*2 {
		return 0, "", fmt.Errorf("feeder %s: its loss at %s is not known: it is stated from %s to %s and holds a factor of two beyond; add a point",
			f.Name, megahertz(freqHz), megahertz(lowest.FreqHz), megahertz(highest.FreqHz))
	}
	if freqHz >= lowest.FreqHz && freqHz <= highest.FreqHz {
		return interpolated(points, freqHz), "", nil
	}
	nearest := lowest
	if freqHz > highest.FreqHz {
		nearest = highest
	}
	note = fmt.Sprintf("feeder %s: loss at %s goes on from %s by the square root of frequency", f.Name, megahertz(freqHz), megahertz(nearest.FreqHz))
	return nearest.DBPerM * math.Sqrt(freqHz/nearest.FreqHz), note, nil
}

// interpolated returns the loss in dB/m at a frequency within ascending points.
func interpolated(points []LossPoint, freqHz float64) float64 {
	i := slices.IndexFunc(points, func(p LossPoint) bool { return p.FreqHz >= freqHz })
	if i == 0 {
		return points[0].DBPerM
	}
	below, above := points[i-1], points[i]
	root, from, to := math.Sqrt(freqHz), math.Sqrt(below.FreqHz), math.Sqrt(above.FreqHz)
	return below.DBPerM + (root-from)/(to-from)*(above.DBPerM-below.DBPerM)
}

func megahertz(freqHz float64) string { return fmt.Sprintf("%g MHz", freqHz/1e6) }

// A Run is a feeder as laid between radio and antenna, with its connectors. The zero Run is no
// feeder: 50 ohm and no loss.
type Run struct {
	Feeder          Feeder
	LengthM         float64
	ConnectorCount  int
	ConnectorLossDB float64 // of each
}

// noFeederOhm is the impedance of a radio without a feeder.
const noFeederOhm = 50

// ImpedanceOhm returns the characteristic impedance of the run, to which its radio is matched.
func (r Run) ImpedanceOhm() float64 {
	if r.Feeder.ImpedanceOhm == 0 {
		return noFeederOhm
	}
	return r.Feeder.ImpedanceOhm
}

// MatchedLossDB returns the loss of the run and its connectors into a matched load at a frequency
// in Hz, with the note of [Feeder.LossDBPerM] if there is one.
func (r Run) MatchedLossDB(freqHz float64) (lossDB float64, note string, err error) {
	err = errors.Join(
		within("feeder length", r.LengthM, 0, 10000, "m"),
		within("connector count", float64(r.ConnectorCount), 0, 100, ""),
		within("connector loss", r.ConnectorLossDB, 0, 10, "dB"),
	)
	if err != nil {
		return 0, "", err
	}
	lossDB = float64(r.ConnectorCount) * r.ConnectorLossDB
	if r.LengthM == 0 {
		return lossDB, "", nil
	}
	perM, note, err := r.Feeder.LossDBPerM(freqHz)
	return lossDB + r.LengthM*perM, note, err
}
