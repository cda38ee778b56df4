package antenna

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"
)

// A Match is the transformer at the antenna's port: it turns the antenna's impedance Z into
// Z/Ratio, and loses LossDB. A zero Ratio means 1, no transformer.
type Match struct{ Ratio, LossDB float64 }

// A Transfer is what becomes of power between a radio and its antenna, in either direction. All
// losses are in dB, not negative.
type Transfer struct {
	// LoadOhm is the antenna's impedance behind its transformer, ReferenceOhm that of line and
	// radio, Reflection the load's reflection coefficient against it.
	LoadOhm      complex128
	ReferenceOhm float64
	Reflection   complex128
	// AntennaVSWR is that at the load, RadioVSWR that at the radio's port.
	AntennaVSWR, RadioVSWR float64
	// TransformerLossDB is the transformer's own; MatchedLossDB that of the feeder and its
	// connectors into a matched load; ExtraLossDB what standing waves add to it; MismatchLossDB
	// the part of the power that the radio's port does not accept.
	TransformerLossDB, MatchedLossDB, ExtraLossDB, MismatchLossDB float64
	// Notes hold what a reader of the budget must know.
	Notes []string
}

// TotalDB returns the sum of the four losses.
func (t Transfer) TotalDB() float64 {
	return t.TransformerLossDB + t.MatchedLossDB + t.ExtraLossDB + t.MismatchLossDB
}

// highVSWR is where transmitters begin to reduce their power: common practice, no source.
const highVSWR = 2

// Transfer brings an antenna's impedance through its transformer and along the run to a radio
// that is matched to the line. antennaOhm needs a positive resistance; freqHz is in Hz.
//
// With a the matched loss as a power ratio and G the load's reflection, the line with standing
// waves loses (a^2 - |G|^2) / (a (1 - |G|^2)), and the radio sees |G|/a, of whose square it gets
// the power back. Together the antenna gets (1 - |G|^2)/a of what the radio has to give. The
// line's impedance is taken as real, and its connectors' loss as spread along it.
//
// Source: transmission-line theory, the same in every handbook.
func (r Run) Transfer(antennaOhm complex128, match Match, freqHz float64) (Transfer, error) {
	if match.Ratio == 0 {
		match.Ratio = 1
	}
	matchedDB, note, err := r.MatchedLossDB(freqHz)
	err = errors.Join(err,
		within("match ratio", match.Ratio, 0.01, 100, ""),
		within("match loss", match.LossDB, 0, 20, "dB"),
		checkLoad(antennaOhm),
	)
	if err != nil {
		return Transfer{}, err
	}
	load, reference := antennaOhm/complex(match.Ratio, 0), r.ImpedanceOhm()
	accepted := acceptedPart(load, reference)
	absorbed := -math.Expm1(-2 * matchedDB / 10 * math.Ln10) // 1 - 1/a^2
	atRadio := min(1, accepted+(1-accepted)*absorbed)        // 1 - |G|^2/a^2
	t := Transfer{
		LoadOhm:           load,
		ReferenceOhm:      reference,
		Reflection:        (load - complex(reference, 0)) / (load + complex(reference, 0)),
		AntennaVSWR:       VSWR(load, reference),
		RadioVSWR:         vswr(atRadio),
		TransformerLossDB: match.LossDB,
		MatchedLossDB:     matchedDB,
		ExtraLossDB:       decibels(atRadio / accepted),
		MismatchLossDB:    decibels(1 / atRadio),
	}
	if note != "" {
		t.Notes = append(t.Notes, note)
	}
	if t.RadioVSWR > highVSWR {
		t.Notes = append(t.Notes, fmt.Sprintf("VSWR %.1f at the radio: most transmitters reduce power above %d", t.RadioVSWR, highVSWR))
	}
	return t, nil
}

// VSWR returns the voltage standing wave ratio of an impedance of positive resistance against a
// real reference, both in ohm: 1 and more.
func VSWR(loadOhm complex128, referenceOhm float64) float64 {
	return vswr(acceptedPart(loadOhm, referenceOhm))
}

// vswr returns (1 + g)/(1 - g) for a reflection of magnitude g, given as 1 - g^2, which stays
// exact where g is close to 1.
func vswr(accepted float64) float64 {
	g := math.Sqrt(1 - accepted)
	return (1 + g) * (1 + g) / accepted
}

// acceptedPart returns 1 - |G|^2, the part of a wave's power that a load takes from a line, 0 to 1.
func acceptedPart(load complex128, referenceOhm float64) float64 {
	return min(1, 4*real(load)*referenceOhm/squared(load+complex(referenceOhm, 0)))
}

// checkLoad returns an error unless an impedance can take power.
func checkLoad(ohm complex128) error {
	if real(ohm) > 0 && !cmplx.IsInf(ohm) && !cmplx.IsNaN(ohm) {
		return nil
	}
	return fmt.Errorf("antenna impedance %.4g ohm is not allowed: its resistance must be above 0, and both parts finite", ohm)
}
