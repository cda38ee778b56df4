package propagation

import (
	"fmt"
	"math"

	"fellreach/terrain"
)

// minIntervalKm is the least distance between two points of a profile, 1 mm: slopes stay finite.
const minIntervalKm = 1e-6

// A limit is a range that a value must keep.
type limit struct {
	name          string
	value, lo, hi float64
	unit          string
}

func (l limit) holds() bool { return l.value >= l.lo && l.value <= l.hi } // false for NaN

func (l limit) check() error {
	if l.holds() {
		return nil
	}
	return fmt.Errorf("%s is %.9g%s, it must lie between %.6g and %.6g%s", l.name, l.value, l.unit, l.lo, l.hi, l.unit)
}

// check returns what is wrong with the part of a path that every method uses. It panics when the
// profile's slices differ in length.
func (p *Path) check() error {
	n := len(p.DistKm)
	if len(p.AslM) != n || len(p.CoverM) != n || len(p.Zone) != n {
		panic(fmt.Sprintf("propagation: ragged profile: %d distances, %d heights, %d covers, %d zones",
			n, len(p.AslM), len(p.CoverM), len(p.Zone)))
	}
	if n < 2 {
		return fmt.Errorf("the profile has %d points, at least 2 are needed", n)
	}
	if err := p.checkPoints(); err != nil {
		return err
	}
	for _, l := range [...]limit{
		{"the length of the profile", p.LengthKm(), 0.001, 20_000, " km"},
		{"the frequency", p.FreqHz / 1e6, minHz / 1e6, maxHz / 1e6, " MHz"},
		{"the transmitter's height above ground", p.TxAglM, 0.01, 20_000, " m"},
		{"the receiver's height above ground", p.RxAglM, 0.01, 20_000, " m"},
		{"the share of vertical polarization", p.VerticalShare, 0, 1, ""},
		{"delta N", p.DeltaN, 1e-3, 150, " N-units/km"},
	} {
		if err := l.check(); err != nil {
			return err
		}
	}
	return nil
}

// checkPoints checks the profile point by point. The bounds are wider than the Earth needs.
func (p *Path) checkPoints() error {
	if p.DistKm[0] != 0 {
		return fmt.Errorf("the profile starts at %g km, it must start at 0", p.DistKm[0])
	}
	for i, d := range p.DistKm {
		switch h, r := p.AslM[i], p.CoverM[i]; {
		case i > 0 && !(d-p.DistKm[i-1] >= minIntervalKm), math.IsInf(d, 0):
			return fmt.Errorf("point %d of the profile lies at %g km after %g km: distances must grow by 1 mm at least", i, d, p.DistKm[max(i-1, 0)])
		case !(h >= -12_000 && h <= 12_000):
			return fmt.Errorf("point %d of the profile (%.3f km) is %g m above sea level, it must lie between -12000 and 12000 m", i, d, h)
		case !(r >= 0 && r <= 1000):
			return fmt.Errorf("point %d of the profile (%.3f km) has a cover of %g m, it must lie between 0 and 1000 m", i, d, r)
		}
		if z := p.Zone[i]; z != terrain.Sea && z != terrain.Coastal && z != terrain.Inland {
			return fmt.Errorf("point %d of the profile (%.3f km) has zone %d: it must be 1 (sea), 3 (coastal land) or 4 (inland)", i, d, z)
		}
	}
	return nil
}
