package link

import (
	"fmt"
	"math"

	"fellreach/link/noise"
)

// Noise is what a station hears when nobody transmits: an environment of Rec. ITU-R P.372, or a
// floor measured at the receiver's port.
type Noise struct {
	Environment noise.Environment // empty: no noise from outside is counted
	// MeasuredDBm counts when MeasuredInHz is above zero.
	MeasuredDBm, MeasuredInHz float64
	Source                    string
}

// A heard is the noise from outside in a direction's receiver: its share of all noise at the
// port, 0 to 1, and the decile of its variation over locations, in dB.
type heard struct{ share, decileDB float64 }

// need writes what the receiver asks for and by how much noise from outside, and that of a
// preamplifier, raises it.
func (f *frontEnd) need(b *Budget) heard {
	n := f.Radio.Needs
	if n.Stated {
		b.add(NeedLine, f.Name+": sensitivity", -n.SensitivityDBm, n.Source)
	} else {
		thermal := noise.ThermalDBm(n.BandwidthHz)
		b.add(NeedLine, f.Name+": noise floor and signal-to-noise ratio", -(thermal + n.FigureDB + n.RequiredSNRDB),
			fmt.Sprintf("k T0 B %.1f dBm in %g kHz, noise figure %g dB, ratio %g dB (%s)", thermal, n.BandwidthHz/1e3, n.FigureDB, n.RequiredSNRDB, n.Source))
	}
	if f.Noise.MeasuredInHz > 0 {
		rise := noise.MeasuredRiseDB(f.Noise.MeasuredDBm, f.Noise.MeasuredInHz, n.FigureDB)
		b.add(NoiseLine, f.Name+": noise measured on site", -rise,
			fmt.Sprintf("%g dBm in %g kHz at the receiver's port (%s), over its own noise figure of %g dB", f.Noise.MeasuredDBm, f.Noise.MeasuredInHz/1e3, f.Noise.Source, n.FigureDB))
		return heard{}
	}
	return f.outsideNoise(b)
}

// outsideNoise writes the line of P.372's noise, through all that lies before the receiver.
func (f *frontEnd) outsideNoise(b *Budget) heard {
	stages, amplified := f.stages()
	outside := noise.Outside{Factor: 1, Source: "none counted"}
	if f.Noise.Environment != "" {
		outside = noise.External(f.Noise.Environment, b.FreqHz)
	}
	name := f.Name + ": noise from outside"
	if amplified {
		name += " and of the preamplifier"
	}
	figure := f.Radio.Needs.FigureDB
	b.add(NoiseLine, name, -noise.RiseDB(outside.Factor, stages, figure),
		fmt.Sprintf("%s: Fa %.1f dB, over a noise figure of %g dB, referred to the receiver's port (%s)", outside.Source, 10*math.Log10(outside.Factor), figure, f.Noise.Source))
	f.note(b, outside.Note)
	return heard{noise.OutsideShare(outside.Factor, stages, figure), outside.DecileDB * outside.ManMadeShare}
}

// stages lists what lies between the antenna and the receiver, the antenna first.
func (f *frontEnd) stages() (list []noise.Stage, amplified bool) {
	insert := func(atMast bool) {
		for i := len(f.Inserts) - 1; i >= 0; i-- {
			switch in := f.Inserts[i]; {
			case in.AtMast != atMast:
			case in.GainDB > 0:
				list, amplified = append(list, noise.Stage{GainDB: in.GainDB, FigureDB: in.FigureDB}), true
			default:
				list = append(list, noise.Passive(in.LossDB))
			}
		}
	}
	list = append(list, noise.Passive(-10*math.Log10(f.solution.Efficiency)+f.HarnessDB+f.line.TransformerLossDB))
	insert(true)
	list = append(list, noise.Passive(f.line.MatchedLossDB+f.line.ExtraLossDB+f.line.MismatchLossDB))
	insert(false)
	return list, amplified
}
