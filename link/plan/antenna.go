package plan

import (
	"fmt"
	"maps"
	"math"
	"slices"

	"fellreach/antenna"
	"fellreach/antenna/wire"
)

// An AntennaQuery asks how one antenna of a plan does as installed.
type AntennaQuery struct {
	Name string
	// Channel names the channel to cut for; empty is the plan's only one. FreqHz, when above zero,
	// takes its place.
	Channel string
	FreqHz  float64
	// MastDiameterM and StandoffM put the antenna beside a mast that goes on and on, standing away
	// from it along its facing; zero leaves it free.
	MastDiameterM, StandoffM float64
	SlantDeg                 float64 // from upright
	Refine                   bool    // solve once more, finer
	Sweep                    bool    // find the VSWR curve
	Bare                     bool    // leave a station's mast out
}

// An AntennaResult is an antenna as installed. The azimuth 0 of its Mount is the facing.
type AntennaResult struct {
	wire.Analysis
	Name, Kind string
	Where      string // how it is installed, for a title; empty when free
	Mount      antenna.Mount
	Toward     *antenna.Direction // asked for by the caller
	Refined    *wire.Refinement
	Curve      []VSWRPoint
	Channel    [2]float64 // edges, Hz; zero where no channel was named
}

// A VSWRPoint is one of a curve over frequency, lengths fixed.
type VSWRPoint struct{ FreqHz, VSWR float64 }

// The VSWR curve reaches this far to both sides, in this many points.
const (
	sweepReach  = 0.08
	sweepPoints = 41
)

// Antenna answers a query. The plan needs no sites and no ground for it (see [LoadAntennas]).
func (p *Plan) Antenna(q AntennaQuery) (*AntennaResult, error) {
	if _, ok := p.Antennas[q.Name]; !ok {
		return nil, &Refusal{fmt.Sprintf("there is no antenna %q", q.Name), known(slices.Sorted(maps.Keys(p.Antennas)), "antenna")}
	}
	if q.StandoffM > 0 && q.MastDiameterM == 0 {
		return nil, &Refusal{"a standoff needs the diameter of its mast", "give both"}
	}
	if q.MastDiameterM > 0 && q.StandoffM == 0 {
		return nil, &Refusal{"a mast needs the antenna's standoff from its axis", "give both"}
	}
	if q.MastDiameterM > 0 && q.StandoffM <= q.MastDiameterM/2 {
		return nil, &Refusal{fmt.Sprintf("a standoff of %g m lies inside a mast of %g m", q.StandoffM, q.MastDiameterM), "it is from axis to axis"}
	}
	b, err := p.built(q.Name)
	if err != nil {
		return nil, (&checker{Plan: p}).at("antennas."+q.Name, err)
	}
	r := &AntennaResult{Name: q.Name, Kind: b.Kind, Mount: antenna.Mount{RollDeg: q.SlantDeg}, Where: q.where()}
	freqHz, err := p.frequencyOf(q, r)
	if err != nil {
		return nil, err
	}
	setting := antenna.Setting{
		FreqHz: freqHz, DesignHz: freqHz, MastDiameterM: q.MastDiameterM, StandoffM: q.StandoffM, RollDeg: q.SlantDeg, MastAboveM: math.Inf(1),
	}
	return r, r.solve(q, b, setting, lineOhm)
}

// lineOhm is the line that the antenna command holds a VSWR against.
const lineOhm = 50

// solve fills in an antenna in a setting, its VSWR against a line behind its transformer.
func (r *AntennaResult) solve(q AntennaQuery, b built, setting antenna.Setting, lineOhm float64) error {
	referenceOhm := lineOhm
	if b.match.Ratio > 0 {
		referenceOhm *= b.match.Ratio
	}
	if b.wires == nil {
		return r.stated(b, setting, referenceOhm)
	}
	return r.solved(q, b.wires, setting, referenceOhm)
}

// solved fills in an antenna of wires; its VSWR is against the reference.
func (r *AntennaResult) solved(q AntennaQuery, wires *wire.Antenna, setting antenna.Setting, referenceOhm float64) error {
	var err error
	if r.Analysis, err = wires.Analyse(setting, referenceOhm); err != nil {
		return err
	}
	if q.Refine {
		refined, err := wires.Refine(setting)
		if err != nil {
			return err
		}
		r.Refined = &refined
	}
	if !q.Sweep {
		return nil
	}
	freqs := make([]float64, sweepPoints)
	for i := range freqs {
		freqs[i] = setting.FreqHz * (1 + sweepReach*(2*float64(i)/(sweepPoints-1)-1))
	}
	impedances, err := wires.Sweep(setting, freqs)
	for i := range impedances {
		r.Curve = append(r.Curve, VSWRPoint{freqs[i], antenna.VSWR(impedances[i], referenceOhm)})
	}
	return err
}

// stated fills in an antenna of its maker's figures.
func (r *AntennaResult) stated(b built, setting antenna.Setting, referenceOhm float64) error {
	s, err := b.Solve(setting)
	if err != nil {
		return err
	}
	r.Analysis = wire.Analysis{
		Solution: s, FreqHz: setting.FreqHz, ReferenceOhm: referenceOhm, VSWR: antenna.VSWR(s.ImpedanceOhm, referenceOhm),
		DirectivityDBi: s.Pattern.PeakDBi, GainDBi: s.Pattern.PeakDBi + 10*math.Log10(s.Efficiency),
	}
	return nil
}

func (q AntennaQuery) where() string {
	text := ""
	if q.MastDiameterM > 0 {
		text = fmt.Sprintf(", %g m from the axis of a mast of %g mm", q.StandoffM, 1000*q.MastDiameterM)
	}
	if q.SlantDeg != 0 {
		text += fmt.Sprintf(", turned %g° from upright", q.SlantDeg)
	}
	return text
}

// frequencyOf returns the frequency of a query, and notes the channel's edges.
func (p *Plan) frequencyOf(q AntennaQuery, r *AntennaResult) (float64, error) {
	name := q.Channel
	if name == "" && len(p.Channels) == 1 {
		name = slices.Collect(maps.Keys(p.Channels))[0]
	}
	ch, ok := p.Channels[name]
	switch {
	case q.Channel != "" && !ok:
		return 0, &Refusal{fmt.Sprintf("there is no channel %q", q.Channel), known(slices.Sorted(maps.Keys(p.Channels)), "channel")}
	case q.FreqHz > 0 && (q.FreqHz < minFreqHz || q.FreqHz > maxFreqHz):
		return 0, &Refusal{fmt.Sprintf("%g MHz is out of range", q.FreqHz/1e6), "it lies from 30 MHz to 6 GHz"}
	case q.FreqHz > 0:
		return q.FreqHz, nil
	case !ok:
		return 0, &Refusal{"the plan has several channels", "name one, or a frequency; " + known(slices.Sorted(maps.Keys(p.Channels)), "channel")}
	}
	c := ch.resolve(name)
	low, high := min(c.OutHz, c.BackHz), max(c.OutHz, c.BackHz)
	r.Channel = [2]float64{low - c.BandwidthHz/2, high + c.BandwidthHz/2}
	return (c.OutHz + c.BackHz) / 2, nil
}
