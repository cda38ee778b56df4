package link

import (
	"math"

	"fellreach/link/propagation"
	"fellreach/terrain"
)

// UnwantedTimePct is the part of the time for which an unwanted signal is looked at: the smallest
// P.1812 knows.
const UnwantedTimePct = 1

// UnwantedDBm returns the level at the receiver's port of a station, from a transmitter that it
// does not want to hear, not exceeded but for [UnwantedTimePct] of the year. The profile is as in
// [Compute].
func UnwantedDBm(from, to *Station, ch Channel, freqHz float64, p terrain.Profile, c Conditions) (float64, error) {
	l := &Link{From: from, To: to, Channel: ch, OneWay: true, Aim: Aim{AvailabilityPct: 50}}
	w, err := newWay(l, p, c)
	if err != nil {
		return 0, err
	}
	w.timePct = UnwantedTimePct
	b, err := w.budget(from, to, freqHz)
	return b.ReceivedDBm, err
}

// focusedDB is a little more than P.1812's line of sight falls below free space for 1 % of the time:
// 2.6 log 50 = 4.42 dB.
const focusedDB = 4.5

// MostUnwantedDBm bounds [UnwantedDBm] from above without looking at the ground: free space, both
// antennas at their peaks, no loss on either side.
func MostUnwantedDBm(from, to *Station, ch Channel, freqHz, distKm float64) (float64, error) {
	tx, err := from.frontEnd(freqHz, ch)
	if err != nil {
		return 0, err
	}
	rx, err := to.frontEnd(freqHz, ch)
	if err != nil {
		return 0, err
	}
	gains := 0.0
	for _, in := range to.Inserts {
		gains += math.Max(0, in.GainDB)
	}
	return from.Radio.PowerDBm + tx.solution.Pattern.PeakDBi + rx.solution.Pattern.PeakDBi + gains - propagation.FreeSpaceDB(freqHz, 1000*distKm) + focusedDB, nil
}
