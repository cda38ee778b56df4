package link

import (
	"fmt"

	"fellreach/antenna"
	"fellreach/link/propagation"
)

// Crossed antennas lose at most this much: on a clear path by Rec. ITU-R BT.419 (from memory), on
// an obstructed one by common practice, no source.
const (
	crossedClearDB      = 16
	crossedObstructedDB = 10
)

// budget computes one direction.
func (w *way) budget(from, to *Station, freqHz float64) (Budget, error) {
	b := Budget{From: from.Name, To: to.Name, FreqHz: freqHz}
	tx, err := from.frontEnd(freqHz, w.link.Channel)
	if err != nil {
		return b, err
	}
	rx, err := to.frontEnd(freqHz, w.link.Channel)
	if err != nil {
		return b, err
	}
	out, in := w.toward(from), w.toward(to)
	b.DepartureDeg, b.ArrivalDeg = out.ElDeg, in.ElDeg
	sent, caught := tx.field(out), rx.field(in)
	share := verticalShare(sent, caught)
	w.verticalShare = share

	b.add(PowerLine, from.Name+": transmitter "+from.Radio.Name, from.Radio.PowerDBm, from.Radio.PowerSource)
	tx.lines(&b, out, true)
	if err := w.pathLines(&b, from, to, freqHz, share); err != nil {
		return b, err
	}
	w.polarizationLine(&b, sent, caught, tx.solution.Pattern.Phased && rx.solution.Pattern.Phased)
	rx.lines(&b, in, false)
	noisy := rx.need(&b)
	if err := w.allowanceLines(&b, freqHz, share); err != nil {
		return b, err
	}
	b.warn("", w.profile.Notes...)
	b.close()
	b.ChancePct = w.conditions.chancePct(b.MarginDB, noisy)
	return b, nil
}

// pathLines writes the basic transmission loss as free space and what the ground and the air add,
// and the losses in the surroundings of both ends.
func (w *way) pathLines(b *Budget, from, to *Station, freqHz, verticalShare float64) error {
	loss, err := w.loss(freqHz, verticalShare)
	if err != nil {
		return err
	}
	m := w.conditions.Method
	b.TransmissionLossDB = loss.DB
	from.surroundingsLine(b, freqHz)
	b.add(LossLine, fmt.Sprintf("free space, %.2f km", w.profile.LengthKm()), -loss.Terms.Lbfs, freeSpaceSource(m, freqHz))
	if m.Name != propagation.FreeSpace.Name {
		b.add(LossLine, "terrain and air", -(loss.DB - loss.Terms.Lbfs), w.pathSource(loss))
	}
	to.surroundingsLine(b, freqHz)
	b.warn("", loss.Notes...)
	return nil
}

// freeSpaceSource says whose free space a method counts from: P.1812 has its own, of 92.4 dB at 1 km
// and 1 GHz where P.525 has 92.45.
func freeSpaceSource(m propagation.Model, freqHz float64) string {
	if m.Name == propagation.P1812.Name {
		return fmt.Sprintf("Lbfs of %s at %g MHz, 0.05 dB under P.525", m.Edition, freqHz/1e6)
	}
	return fmt.Sprintf("P.525 at %g MHz", freqHz/1e6)
}

// pathSource says what the loss beyond free space comes from.
func (w *way) pathSource(loss propagation.Loss) string {
	m, t := w.conditions.Method, loss.Terms
	text := fmt.Sprintf("%s over %d points of %.0f m, median Earth radius %.0f km", m.Edition, len(w.profile.DistKm), w.stepM(), t.Ae)
	if m.Name == propagation.P1812.Name {
		text += fmt.Sprintf("; diffraction %.1f dB, troposcatter alone %.1f dB", t.Ld50, t.Lbs)
	}
	return text
}

// verticalShare is the part of the power between two antennas that goes by vertical polarization,
// the same whichever of them transmits. Crossed antennas share none: then it is the mean of both.
func verticalShare(a, b antenna.Field) float64 {
	va, vb := a.VerticalShare(), b.VerticalShare()
	vertical, horizontal := va*vb, (1-va)*(1-vb)
	if vertical+horizontal == 0 {
		return (va + vb) / 2
	}
	return vertical / (vertical + horizontal)
}

func (w *way) stepM() float64 {
	return w.profile.LengthKm() * 1000 / float64(len(w.profile.DistKm)-1)
}

func (w *way) polarizationLine(b *Budget, sent, caught antenna.Field, phased bool) {
	floor, source := float64(crossedClearDB), "antennas as installed, at most 16 dB (BT.419, from memory)"
	if w.trans {
		floor, source = crossedObstructedDB, "antennas as installed, at most 10 dB on an obstructed path (common practice, no source)"
	}
	if !phased && slanted(sent) && slanted(caught) {
		source += "; phases not known, taken as zero"
	}
	b.add(LossLine, "polarization", -antenna.PolarizationMatchDB(sent, caught, floor), source)
}

// slanted tells whether a field has both components to speak of: between two such the phases count.
func slanted(f antenna.Field) bool {
	const least = 1e-6
	share := f.VerticalShare()
	return share > least && share < 1-least
}

// allowanceLines writes the fading allowance, stated or computed, and the planner's own.
func (w *way) allowanceLines(b *Budget, freqHz, verticalShare float64) error {
	q := w.link.Aim.AvailabilityPct
	if q > 50 {
		fade, err := w.fade(freqHz, verticalShare)
		if err != nil {
			return err
		}
		b.FadeDB = fade.LossDB
		b.add(AllowanceLine, fmt.Sprintf("fading, %g %% of the year", q), -fade.LossDB, fade.Source)
	}
	for _, a := range w.link.Allowances {
		b.add(AllowanceLine, a.Name, -a.LossDB, a.Source)
	}
	return nil
}
