package plan

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"

	"fellreach/link"
	"fellreach/terrain/raster"
)

// maxUnwanted bounds how many unwanted paths one run computes; a plan of more is told so.
const maxUnwanted = 20000

// addInterference warns of directions whose receiver hears transmitters of other links on its
// frequency too well: wanted level (median) over unwanted (exceeded for 1 % of the time) below the
// radio's capture value. Stations that talk with either end of the direction are of one net with
// it, take turns and do not count.
func (n *Network) addInterference(ctx context.Context, r *Result) error {
	partners, looked := n.partners(), 0
	for _, l := range r.Links {
		for i := range l.Directions {
			b := &l.Directions[i]
			to := n.Stations[b.To]
			if to.Radio.Needs.CaptureDB == 0 {
				continue
			}
			var loud []heard
			for from := range n.transmitters(b.FreqHz, l.Link.Channel.BandwidthHz) {
				if from == to || from.Order == to.Order || partners[to][from] || partners[n.Stations[b.From]][from] {
					continue
				}
				if looked++; looked > maxUnwanted {
					r.Notes = append(r.Notes, fmt.Sprintf("interference was looked at on the first %d unwanted paths only", maxUnwanted))
					return nil
				}
				if err := ctx.Err(); err != nil {
					return err
				}
				level, audible, err := n.unwantedDBm(l.Link.Channel, b, from, to)
				if err != nil {
					r.Notes = append(r.Notes, fmt.Sprintf("whether %s disturbs %s is not known: %v", from.Name, to.Name, err))
				}
				if err == nil && audible && b.ReceivedDBm-level < to.Radio.Needs.CaptureDB {
					loud = append(loud, heard{from.Name, level})
				}
			}
			if len(loud) > 0 {
				l.Warnings = append(l.Warnings, link.Warning{At: to.Name, Text: interferenceText(b, loud, to.Radio.Needs.CaptureDB)})
			}
		}
	}
	return nil
}

// heard is an unwanted transmitter and its level at the receiver's port.
type heard struct {
	name string
	dBm  float64
}

func interferenceText(b *link.Budget, loud []heard, captureDB float64) string {
	worst := slices.MaxFunc(loud, func(a, b heard) int { return cmp.Compare(a.dBm, b.dBm) })
	text := fmt.Sprintf("on %g MHz hears %s at %.0f dBm for %d %% of the time, and %s at %.0f dBm: %.1f dB between them where it needs %g dB",
		b.FreqHz/1e6, worst.name, worst.dBm, link.UnwantedTimePct, b.From, b.ReceivedDBm, b.ReceivedDBm-worst.dBm, captureDB)
	if others := len(loud) - 1; others > 0 {
		text += fmt.Sprintf("; %d others disturb it too", others)
	}
	return text
}

// partners tells for each station which stations it has links with.
func (n *Network) partners() map[*link.Station]map[*link.Station]bool {
	all := map[*link.Station]map[*link.Station]bool{}
	add := func(a, b *link.Station) {
		if all[a] == nil {
			all[a] = map[*link.Station]bool{}
		}
		all[a][b] = true
	}
	for _, l := range n.Links {
		add(l.From, l.To)
		add(l.To, l.From)
	}
	return all
}

// transmitters runs over the stations that transmit on a frequency, each once, in the order of
// the links.
func (n *Network) transmitters(freqHz, bandwidthHz float64) func(func(*link.Station) bool) {
	return func(yield func(*link.Station) bool) {
		seen := map[*link.Station]bool{}
		for _, l := range n.Links {
			ends := map[*link.Station]float64{l.From: l.Channel.OutHz}
			if !l.OneWay {
				ends[l.To] = l.Channel.BackHz
			}
			for _, s := range []*link.Station{l.From, l.To} {
				hz, transmits := ends[s]
				if !transmits || seen[s] || math.Abs(hz-freqHz) >= (bandwidthHz+l.Channel.BandwidthHz)/2 {
					continue
				}
				seen[s] = true
				if !yield(s) {
					return
				}
			}
		}
	}
}

// unwantedDBm computes the level of an unwanted transmitter; audible is false where even free
// space and both antennas' peaks leave it harmless.
func (n *Network) unwantedDBm(ch link.Channel, b *link.Budget, from, to *link.Station) (level float64, audible bool, err error) {
	distM, _, _ := raster.Inverse(from.At, to.At)
	most, err := link.MostUnwantedDBm(from, to, ch, b.FreqHz, distM/1000)
	if err != nil || b.ReceivedDBm-most >= to.Radio.Needs.CaptureDB {
		return 0, false, err
	}
	ground, err := n.profile(from, to)
	if err != nil {
		return 0, false, err
	}
	level, err = link.UnwantedDBm(from, to, ch, b.FreqHz, ground, n.Conditions)
	return level, true, err
}
