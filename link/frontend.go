package link

import (
	"fmt"
	"math"
	"slices"

	"fellreach/antenna"
)

// A frontEnd is a station at one frequency: the antenna solved as installed, and what lies
// between it and the radio.
type frontEnd struct {
	*Station
	solution antenna.Solution
	mounted  antenna.Mounted // the solution's pattern
	line     antenna.Transfer
	// cutForAnother tells that the antenna's resonant lengths are those of another channel.
	cutForAnother bool
}

// frontEnd solves the station's antenna at a frequency of the channel. The impedance counts at
// whichever of the channel's edges or its centre delivers the least.
func (s *Station) frontEnd(freqHz float64, c Channel) (frontEnd, error) {
	f := frontEnd{Station: s, cutForAnother: s.CutForHz > 0 && s.CutForHz != c.CentreHz()}
	for i, hz := range [...]float64{freqHz, freqHz - c.BandwidthHz/2, freqHz + c.BandwidthHz/2} {
		solution, err := s.Antenna.Solve(s.setting(hz, c.CentreHz()))
		if err != nil {
			return frontEnd{}, fmt.Errorf("%s: antenna %s: %w", s.Name, s.Antenna.Name, err)
		}
		line, err := s.Run.Transfer(solution.ImpedanceOhm, s.Match, hz)
		if err != nil {
			return frontEnd{}, fmt.Errorf("%s: %w", s.Name, err)
		}
		if i == 0 {
			f.solution, f.mounted, f.line = solution, s.Mount.On(solution.Pattern), line
		} else if line.TotalDB() > f.line.TotalDB() {
			f.line = line
		}
	}
	return f, nil
}

// setting is how the station's antenna is used on a channel.
func (s *Station) setting(freqHz, designHz float64) antenna.Setting {
	if s.CutForHz > 0 {
		designHz = s.CutForHz
	}
	setting := antenna.Setting{FreqHz: freqHz, DesignHz: designHz, MastDiameterM: s.MastDiameterM, StandoffM: s.StandoffM}
	if s.MastDiameterM > 0 {
		setting.MastAboveM, setting.RollDeg = s.MastAboveM, s.Mount.RollDeg
	}
	return setting
}

// field returns the antenna's field towards a direction, its nulls filled.
func (f *frontEnd) field(toward antenna.Direction) antenna.Field {
	return f.mounted.Filled(toward)
}

// lines writes the station's part of a budget, from radio to antenna for the transmitter and the
// other way for the receiver.
func (f *frontEnd) lines(b *Budget, toward antenna.Direction, transmits bool) {
	var part []Line
	add := func(kind Kind, name string, dB float64, source string) {
		part = append(part, Line{f.Name + ": " + name, dB, kind, source})
	}
	f.insertLines(add, transmits, false)
	f.feederLines(add)
	f.insertLines(add, transmits, true)
	f.antennaLines(add, toward)
	if !transmits {
		slices.Reverse(part)
	}
	b.Lines = append(b.Lines, part...)
	b.warn(f.Name, f.warnings(toward)...)
	if f.cutForAnother && !f.solution.GainKnown {
		b.Remarks = addWarning(b.Remarks, Warning{f.Name, fmt.Sprintf("its resonant lengths are cut for %g MHz, the channel of its first link", f.CutForHz/1e6)})
	}
	for _, text := range f.solution.Remarks {
		b.Remarks = addWarning(b.Remarks, Warning{f.Name, text})
	}
}

func (f *frontEnd) insertLines(add func(Kind, string, float64, string), transmits, atMast bool) {
	for _, in := range f.Inserts {
		switch {
		case in.AtMast != atMast, in.ReceiveOnly && transmits:
		case in.GainDB > 0:
			add(GainLine, in.Name, in.GainDB, in.Source)
		default:
			add(LossLine, in.Name, -in.LossDB, in.Source)
		}
	}
}

func (f *frontEnd) feederLines(add func(Kind, string, float64, string)) {
	load := impedance(f.line.LoadOhm)
	if r := f.Match.Ratio; r != 0 && r != 1 {
		load += fmt.Sprintf(" behind %g:1", r)
	}
	add(LossLine, "mismatch at the radio", -f.line.MismatchLossDB,
		fmt.Sprintf("VSWR %.2f at the radio, %.2f at the antenna (%s)", f.line.RadioVSWR, f.line.AntennaVSWR, load))
	connectorsDB := float64(f.Run.ConnectorCount) * f.Run.ConnectorLossDB
	if f.Run.LengthM > 0 {
		add(LossLine, fmt.Sprintf("feeder %s, %g m", f.Run.Feeder.Name, f.Run.LengthM), connectorsDB-f.line.MatchedLossDB, f.RunSource+", by the square root of frequency")
	}
	if f.Run.ConnectorCount > 0 {
		add(LossLine, fmt.Sprintf("connectors, %d of %g dB", f.Run.ConnectorCount, f.Run.ConnectorLossDB), -connectorsDB, f.ConnectorSource)
	}
	if f.line.MatchedLossDB > 0 {
		add(LossLine, "standing waves on the feeder", -f.line.ExtraLossDB, "line theory: what a mismatched line loses beyond its matched loss")
	}
	if f.Match.LossDB > 0 {
		add(LossLine, "matching transformer", -f.line.TransformerLossDB, f.MatchSource)
	}
	if f.HarnessDB > 0 {
		add(LossLine, "harness", -f.HarnessDB, f.HarnessSource)
	}
}

func (f *frontEnd) antennaLines(add func(Kind, string, float64, string), toward antenna.Direction) {
	name := "directivity towards the path"
	if f.solution.GainKnown {
		name = "gain towards the path"
	} else {
		add(LossLine, "conductor loss", 10*math.Log10(f.solution.Efficiency), fmt.Sprintf("efficiency %.3f", f.solution.Efficiency))
	}
	add(GainLine, name, f.field(toward).GainDBi(),
		fmt.Sprintf("%s (%s): %s; az %.1f el %+.2f", f.Antenna.Name, f.AntennaSource, f.solution.Source, toward.AzDeg, toward.ElDeg))
}

// impedance writes an impedance as the trade does.
func impedance(z complex128) string {
	sign := "+"
	if imag(z) < 0 {
		sign = "-"
	}
	return fmt.Sprintf("%.1f %s j%.1f ohm", real(z), sign, math.Abs(imag(z)))
}

func (f *frontEnd) warnings(toward antenna.Direction) []string {
	list := slices.Concat(f.solution.Notes, f.line.Notes)
	if f.StandoffM > 0 && f.MastDiameterM == 0 {
		list = append(list, "stands off a mast whose diameter or width is not stated: the mast's effect is not computed")
	}
	// A vertical beam narrower than 2 degrees is none of this program's antennas.
	if off := math.Abs(toward.ElDeg - f.Mount.TiltDeg); off > 1 {
		if width := f.Mount.VerticalWidthDeg(f.solution.Pattern); off > width/2 {
			list = append(list, fmt.Sprintf("the path leaves %.1f degrees off the antenna's axis, outside its vertical beamwidth of %.0f degrees", off, width))
		}
	}
	return list
}
