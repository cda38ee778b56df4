package antenna

import (
	"errors"
	"fmt"
	"slices"
)

// A Port is what a maker states of an antenna's impedance: that of the line it is made for in
// ohm, and the VSWR it shows there. Zero means 50 ohm and a VSWR of 1.
type Port struct{ ImpedanceOhm, VSWR float64 }

// checked returns the port with its defaults filled in, or an error.
func (p Port) checked() (Port, error) {
	if p.ImpedanceOhm == 0 {
		p.ImpedanceOhm = 50
	}
	if p.VSWR == 0 {
		p.VSWR = 1
	}
	return p, errors.Join(
		within("impedance", p.ImpedanceOhm, 1, 10000, "ohm"),
		within("vswr", p.VSWR, 1, 20, ""),
	)
}

// loadOhm returns a resistance that shows the stated VSWR: its magnitude is known, its phase is
// not.
func (p Port) loadOhm() complex128 { return complex(p.ImpedanceOhm*p.VSWR, 0) }

// source says what was taken as the impedance.
func (p Port) source() string {
	if p.VSWR == 1 {
		return fmt.Sprintf("%g ohm", p.ImpedanceOhm)
	}
	return fmt.Sprintf("VSWR %g against %g ohm: phase unknown, taken as resistive", p.VSWR, p.ImpedanceOhm)
}

// A stated antenna is one whose gain and impedance come from its maker or a reference, the same
// at every frequency.
type stated struct {
	pattern Pattern
	port    Port
	source  string
	notes   []string
	notesAt func(Setting) []string // what depends on the setting; may be nil
}

func (a stated) solve(s Setting) (Solution, error) {
	s, err := s.Checked()
	if err != nil {
		return Solution{}, err
	}
	notes := slices.Clone(a.notes)
	if a.notesAt != nil {
		notes = append(notes, a.notesAt(s)...)
	}
	if s.StandoffM > 0 {
		notes = append(notes, s.mastNote("a stated pattern")...)
	}
	return Solution{
		Pattern:      a.pattern,
		ImpedanceOhm: a.port.loadOhm(),
		Efficiency:   1,
		GainKnown:    true,
		Source:       a.source + "; " + a.port.source(),
		Notes:        notes,
	}, nil
}

// excessNotes says when a stated pattern radiates more than it is fed, by more than rounded
// figures explain.
func excessNotes(p Pattern) []string {
	const explainedDB = 1
	excessDB := decibels(p.MeanGain())
	if excessDB <= explainedDB {
		return nil
	}
	return []string{fmt.Sprintf("the stated gain is %.1f dB more than a lossless antenna of this pattern has: check gain and pattern", excessDB)}
}
