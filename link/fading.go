package link

import (
	"fmt"
	"math"

	"fellreach/link/propagation"

	"gonum.org/v1/gonum/stat/distuv"
)

// MaxAvailabilityPct is the highest availability of an average year for which a fading allowance
// is computed. Beyond mirroredPct it is scaled, since P.1812 ends at 1 % of the time.
const (
	MaxAvailabilityPct = 99.9
	mirroredPct        = 99
)

// fade returns the fading allowance of the link's availability, stated or computed.
//
// Computed, it is max[0, Lx(50) - Lx(100 - q)], Lx being P.1812 with ducting left out: the
// enhancement of the signal in the best 100 - q % of the year, mirrored about the median (an
// approximation; common practice, no source). Beyond 99 % it grows by the normal quantile,
// z(q)/z(99). On a line of sight where P.530 speaks its multipath depth counts when that is
// larger: never the sum.
func (w *way) fade(freqHz, verticalShare float64) (Allowance, error) {
	if w.link.Fade != nil {
		return *w.link.Fade, nil
	}
	q := w.link.Aim.AvailabilityPct
	if w.conditions.Method.Name != propagation.P1812.Name {
		return Allowance{}, fmt.Errorf("method %s does not compute the fading that %g %% availability asks for: state it, or ask for 50 %%", w.conditions.Method.Name, q)
	}
	if q > MaxAvailabilityPct {
		return Allowance{}, fmt.Errorf("no fading allowance is computed for %g %% availability: the most is %g %%", q, MaxAvailabilityPct)
	}
	mirrored, err := w.mirroredFadeDB(q, freqHz, verticalShare)
	if err != nil {
		return Allowance{}, err
	}
	if m := w.multipath(freqHz); !w.trans && m.Applies() {
		if deep := m.FadeDB(q); deep > mirrored {
			return Allowance{LossDB: deep, Source: fmt.Sprintf("P.530-17 multipath, worst month to average year; dN1 %g N/km (%s); the mirrored P.1812 gives %.1f dB, not added", m.Dn1, w.conditions.Dn1Source, mirrored)}, nil
		}
	}
	source := fmt.Sprintf("P.1812 without ducting: loss for 50 %% less loss for %.3g %% of the time, mirrored about the median (an approximation)", 100-q)
	if q > mirroredPct {
		source = fmt.Sprintf("P.1812 without ducting: loss for 50 %% less loss for 1 %% of the time, mirrored about the median (an approximation), times z(%g %%)/z(99 %%)", q)
	}
	return Allowance{LossDB: mirrored, Source: source}, nil
}

func (w *way) mirroredFadeDB(q, freqHz, verticalShare float64) (float64, error) {
	path := w.path(freqHz, verticalShare)
	median, err := propagation.P1812WithoutDucting(path)
	if err != nil {
		return 0, err
	}
	path.TimePct = 100 - math.Min(q, mirroredPct)
	best, err := propagation.P1812WithoutDucting(path)
	if err != nil {
		return 0, err
	}
	return FadeDB(q, median.DB, best.DB), nil
}

// FadeDB mirrors about the median: it returns the fading allowance in dB for an availability of q
// percent from the losses without ducting for 50 % of the time and for [MirroredTimePct].
func FadeDB(q, medianLossDB, bestLossDB float64) float64 {
	fade := math.Max(0, medianLossDB-bestLossDB)
	if q > mirroredPct {
		fade *= distuv.UnitNormal.Quantile(q/100) / distuv.UnitNormal.Quantile(mirroredPct/100.0)
	}
	return fade
}

// MirroredTimePct is the part of the time, in percent, whose loss an availability of q percent
// is mirrored from.
func MirroredTimePct(q float64) float64 { return 100 - math.Min(q, mirroredPct) }

func (w *way) multipath(freqHz float64) propagation.Multipath {
	p := w.path(freqHz, 1)
	last := len(p.AslM) - 1
	return propagation.Multipath{
		FreqHz: freqHz, LengthKm: p.LengthKm(), TxAslM: p.AslM[0] + p.TxAglM, RxAslM: p.AslM[last] + p.RxAglM,
		LatDeg: p.LatDeg, Dn1: w.conditions.Dn1, RoughnessM: w.conditions.RoughnessM,
	}
}
