package plan

import (
	"fmt"
	"maps"
	"slices"
	"strings"
)

// The frequencies Fellreach speaks for: those of Rec. ITU-R P.1812.
const (
	minFreqHz = 30e6
	maxFreqHz = 6e9
)

// The steps that a profile may have, in metres: beyond a kilometre, hills are missed.
const (
	minStepM = 1.0
	maxStepM = 1000.0
)

// A checker holds a plan against what its form cannot say: references, alternatives, ranges.
type checker struct {
	*Plan
	errs Errors
}

func (p *Plan) check() Errors {
	c := &checker{Plan: p}
	c.aim("aim", p.Aim)
	if p.Prediction.Readings == 1 {
		c.wrong("prediction.readings", "one reading gives no spread", "state two or more, or 0 where the spread is assumed")
	}
	if step := p.Ground.Step; step != nil {
		c.within("ground.step", float64(*step), minStepM, maxStepM, "m")
	}
	for name, ch := range sorted(p.Channels) {
		c.channel("channels."+name, ch)
	}
	for name, r := range sorted(p.Radios) {
		c.radio("radios."+name, r)
	}
	for name, a := range sorted(p.Antennas) {
		c.antenna("antennas."+name, name, a)
	}
	c.sites()
	c.links()
	for i, w := range p.Coverage {
		c.coverage(fmt.Sprintf("coverage[%d]", i), w)
	}
	for i, w := range p.Weigh {
		c.weigh(fmt.Sprintf("weigh[%d]", i), w)
	}
	return c.errs
}

// wrong reports a problem at the place of a path, or at the nearest part of it in the file.
func (c *checker) wrong(path, problem, hint string) {
	place, probe := position{1, 1}, path
	for probe != "" {
		if p, ok := c.where[probe]; ok {
			place = p
			break
		}
		probe = probe[:max(strings.LastIndexAny(probe, ".["), 0)]
	}
	c.errs = append(c.errs, &Error{c.file, place.line, place.column, path, problem, hint})
}

// within reports a value outside its range; low and high are written as the plan writes them.
func (c *checker) within(path string, value, low, high float64, unit string) {
	if value < low || value > high {
		c.wrong(path, fmt.Sprintf("%g %s is out of range", value, unit), fmt.Sprintf("it lies from %g to %g %s", low, high, unit))
	}
}

// refers reports a name that stands in no table of the plan.
func refers[T any](c *checker, path, name string, table map[string]T, what string) bool {
	if _, ok := table[name]; ok {
		return true
	}
	c.wrong(path, fmt.Sprintf("there is no %s %q", what, name), known(slices.Sorted(maps.Keys(table)), what))
	return false
}

func known(names []string, what string) string {
	if len(names) == 0 {
		return "the plan names no " + what
	}
	if len(names) > 12 {
		names = append(slices.Clone(names[:12]), "others")
	}
	return "the plan has " + strings.Join(names, ", ")
}

// sorted runs over a table in the order of its names, so that nothing depends on chance.
func sorted[T any](table map[string]T) func(yield func(string, T) bool) {
	return func(yield func(string, T) bool) {
		for _, name := range slices.Sorted(maps.Keys(table)) {
			if !yield(name, table[name]) {
				return
			}
		}
	}
}

func (c *checker) aim(path string, a *Aim) {
	if a == nil {
		return
	}
	if a.Availability != nil {
		c.within(path+".availability", float64(*a.Availability), 50, 99.9, "%")
	}
	if a.Margin != nil && a.Chance != nil {
		c.wrong(path, "has a margin and a chance", "an aim is one or the other")
	}
	if a.Chance != nil {
		c.within(path+".chance", float64(*a.Chance), 1, 99.9, "%")
	}
}

func (c *checker) channel(path string, ch Channel) {
	switch {
	case ch.Frequency != nil && (ch.Out != nil || ch.Back != nil):
		c.wrong(path, "has frequency and out or back", "write frequency alone, or out and back")
	case ch.Frequency == nil && (ch.Out == nil || ch.Back == nil):
		c.wrong(path, "has no frequency", "write frequency, or out and back")
	}
	for key, f := range map[string]*Frequency{"frequency": ch.Frequency, "out": ch.Out, "back": ch.Back} {
		if f != nil && (*f < minFreqHz || *f > maxFreqHz) {
			c.wrong(path+"."+key, fmt.Sprintf("%g MHz is out of range", float64(*f)/1e6), "it lies from 30 MHz to 6 GHz")
		}
		if f != nil && ch.Bandwidth > *f/10 {
			c.wrong(path+".bandwidth", fmt.Sprintf("%g kHz is over a tenth of the frequency", float64(ch.Bandwidth)/1e3), "")
		}
	}
}

func (c *checker) radio(path string, r Radio) {
	switch {
	case r.Sensitivity != nil && r.RequiredSNR != nil:
		c.wrong(path, "has a sensitivity and a required_snr", "a receiver is given by its sensitivity, or by noise_figure, noise_bandwidth and required_snr")
	case r.Sensitivity == nil && (r.NoiseFigure == nil || r.NoiseBandwidth == nil || r.RequiredSNR == nil):
		c.wrong(path, "does not say what it needs to receive", "write sensitivity, or noise_figure, noise_bandwidth and required_snr")
	}
	if r.Power != nil {
		c.within(path+".power", float64(*r.Power), -30, 80, "dBm")
	}
	if r.Sensitivity != nil {
		c.within(path+".sensitivity", float64(*r.Sensitivity), -180, 0, "dBm")
	}
	if r.NoiseFigure != nil {
		c.within(path+".noise_figure", float64(*r.NoiseFigure), 0, 40, "dB")
	}
	c.within(path+".duty", float64(*r.Duty), 0, 100, "%")
}

func (c *checker) antenna(path, name string, a Antenna) {
	switch spec := a.Spec.(type) {
	case *Stack:
		if refers(c, path+".of", spec.Of, c.Antennas, "antenna") && c.Antennas[spec.Of].Kind == "stack" {
			c.wrong(path+".of", fmt.Sprintf("%q is a stack itself", spec.Of), "a stack is made of single antennas")
		}
	case *Yagi:
		driven := 0
		for i, e := range spec.Elements {
			if e.Driven {
				driven++
			} else if e.Length.Resonant {
				c.wrong(fmt.Sprintf("%s.elements[%d].length", path, i), "only the driven element can be resonant", "give its length")
			}
		}
		if driven != 1 {
			c.wrong(path+".elements", fmt.Sprintf("%d elements are driven", driven), "write driven: true at one element")
		}
	case *FoldedDipole:
		if spec.Spacing <= spec.Diameter {
			c.wrong(path+".spacing", "its rods touch", "spacing is from axis to axis and larger than the diameter")
		}
	case *Wires:
		for i, f := range spec.Feeds {
			if f.Wire > len(spec.Wires) {
				c.wrong(fmt.Sprintf("%s.feeds[%d].wire", path, i), fmt.Sprintf("there is no wire %d", f.Wire), fmt.Sprintf("there are %d wires, counted from 1", len(spec.Wires)))
			}
		}
	case *PatternCuts:
		c.within(path+".gain", float64(spec.Gain), -20, 40, "dBi")
	case *Omni:
		c.within(path+".gain", float64(spec.Gain), -20, 20, "dBi")
	case *Datasheet:
		c.within(path+".gain", float64(spec.Gain), -20, 40, "dBi")
		c.within(path+".width_h", float64(spec.WidthH), 1, 360, "deg")
		c.within(path+".width_v", float64(spec.WidthV), 1, 360, "deg")
	}
}
