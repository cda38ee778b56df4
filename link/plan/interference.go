package plan

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"

	"fellreach/link"
	"fellreach/link/propagation"
	"fellreach/terrain/raster"
)

// maxUnwanted bounds how many unwanted paths one run computes; a plan of more is told so.
const maxUnwanted = 20000

// addInterference warns of directions whose receiver hears transmitters of other links on its
// frequency too well: wanted level (median) over unwanted (exceeded for 1 % of the time) below the
// radio's capture value. Stations that talk with either end of the direction are of one net with
// it, take turns and do not count.
func (n *Network) addInterference(ctx context.Context, r *Result) error {
	search := interference{Network: n, partners: n.partners()}
	for _, l := range r.Links {
		for i := range l.Directions {
			if err := ctx.Err(); err != nil {
				return err
			}
			b := &l.Directions[i]
			if loud := search.loud(b, l.Link.Channel); len(loud) > 0 {
				l.Warnings = append(l.Warnings, link.Warning{At: b.To, Text: n.interferenceText(b, loud)})
			}
		}
	}
	r.Notes = append(r.Notes, search.notes...)
	if search.looked > maxUnwanted {
		r.Notes = append(r.Notes, fmt.Sprintf("interference was looked at on the first %d unwanted paths only", maxUnwanted))
	}
	return nil
}

// An interference is a search for unwanted paths on its way.
type interference struct {
	*Network
	partners map[*link.Station]map[*link.Station]bool
	looked   int
	notes    []string
}

// loud lists the transmitters that disturb a direction.
func (s *interference) loud(b *link.Budget, ch link.Channel) []heard {
	wanted, to := s.Stations[b.From], s.Stations[b.To]
	captureDB := to.Radio.Needs.CaptureDB
	var list []heard
	for from := range s.transmitters(b.FreqHz, ch.BandwidthHz) {
		if captureDB == 0 || from.Order == to.Order || s.partners[to][from] || s.partners[wanted][from] {
			continue
		}
		if s.looked++; s.looked > maxUnwanted {
			return list
		}
		level, audible, err := s.unwantedDBm(ch, b, from, to)
		switch {
		case err != nil:
			s.notes = append(s.notes, fmt.Sprintf("whether %s disturbs %s is not known: %v", from.Name, to.Name, err))
		case audible && b.ReceivedDBm-level < captureDB:
			list = append(list, heard{from.Name, level})
		}
	}
	return list
}

// heard is an unwanted transmitter and its level at the receiver's port.
type heard struct {
	name string
	dBm  float64
}

func (n *Network) interferenceText(b *link.Budget, loud []heard) string {
	worst := slices.MaxFunc(loud, func(a, b heard) int { return cmp.Compare(a.dBm, b.dBm) })
	often := fmt.Sprintf("for %d %% of the time", link.UnwantedTimePct)
	if n.Conditions.Method.Name != propagation.P1812.Name {
		often = "in the median (the method knows no other time)"
	}
	text := fmt.Sprintf("on %g MHz hears %s at %.0f dBm %s, and %s at %.0f dBm: %.1f dB between them where it needs %g dB",
		b.FreqHz/1e6, worst.name, worst.dBm, often, b.From, b.ReceivedDBm, b.ReceivedDBm-worst.dBm, n.Stations[b.To].Radio.Needs.CaptureDB)
	switch others := len(loud) - 1; {
	case others == 1:
		text += "; another disturbs it too"
	case others > 1:
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
