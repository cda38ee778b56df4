package plan

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/terrain/raster"
)

// InstalledAntenna answers for the antenna of a station as it hangs there: on its mast, turned to its
// facing, against its feeder. Of the query, Channel (or FreqHz), Refine, Sweep and Bare count;
// its other fields say nothing. The mount of the result is the station's, so that its azimuths are true.
func (n *Network) InstalledAntenna(station string, q AntennaQuery) (*AntennaResult, error) {
	s := n.Stations[station]
	if s == nil {
		return nil, &Refusal{fmt.Sprintf("there is no station %.60q", station), n.stationNames()}
	}
	b, err := n.design(s.Antenna.Name)
	if err != nil {
		return nil, err
	}
	if i := n.firstLink(s); q.Channel == "" && q.FreqHz == 0 && i >= 0 {
		q.Channel = n.Links[i].Channel.Name
	}
	r := &AntennaResult{Name: b.Name, Kind: b.Kind, Mount: s.Mount, Where: " at " + station}
	freqHz, err := n.plan.frequencyOf(q, r)
	if err != nil {
		return nil, err
	}
	setting := antenna.Setting{FreqHz: freqHz, DesignHz: s.CutForHz, MastDiameterM: s.MastDiameterM, StandoffM: s.StandoffM}
	if q.Bare {
		setting.MastDiameterM, setting.StandoffM = 0, 0
	}
	if setting.MastDiameterM > 0 {
		setting.MastAboveM, setting.RollDeg = s.MastAboveM, s.Mount.RollDeg
	}
	return r, r.solve(q, b, setting, s.Run.ImpedanceOhm())
}

// Refitted returns a station as it would be with another antenna at another height above ground.
// Mast and feeder grow or shrink with the height, the feeder to no less than nothing. An antenna with
// a beam at a station that states no facing is turned to the other end of the station's first link.
func (n *Network) Refitted(s *link.Station, antennaName string, aglM float64) (*link.Station, error) {
	if _, known := n.plan.Antennas[antennaName]; !known {
		return nil, n.noAntenna(antennaName)
	}
	if !(aglM >= minAglM && aglM <= maxAglM) {
		return nil, fmt.Errorf("a height of %g m above ground is not allowed: %g to %g m are", aglM, minAglM, maxAglM)
	}
	c := &checker{Plan: n.plan}
	b, err := n.design(antennaName)
	if err != nil {
		return nil, c.at("antennas."+antennaName, err)
	}
	out := *s
	out.Antenna, out.Match, out.HarnessDB = b.Design, b.match, b.harnessDB
	out.AntennaSource = c.source("antennas." + antennaName)
	out.MatchSource, out.HarnessSource = c.source("antennas."+antennaName+".match"), c.source("antennas."+antennaName+".harness")
	out.Run.LengthM = max(0, s.Run.LengthM+aglM-s.AglM)
	out.AglM = aglM
	if i := n.firstLink(s); b.Directional && n.plan.station(s).Antenna.Facing == nil && i >= 0 {
		far := n.Links[i].From
		if far == s {
			far = n.Links[i].To
		}
		_, out.Mount.FacingDeg, _ = raster.Inverse(s.At, far.At)
	}
	return &out, nil
}

// design returns an antenna of the plan made ready, and remembers it.
func (n *Network) design(name string) (built, error) {
	n.designing.Lock()
	defer n.designing.Unlock()
	if b, ok := n.designs[name]; ok {
		return b, nil
	}
	b, err := n.plan.built(name)
	if err == nil {
		n.designs[name] = b
	}
	return b, err
}

// firstLink returns the index of the first link of a station, -1 if it has none.
func (n *Network) firstLink(s *link.Station) int {
	return slices.IndexFunc(n.Links, func(l *link.Link) bool { return l.From == s || l.To == s })
}

// station returns a station as the plan writes it.
func (p *Plan) station(s *link.Station) Station {
	site := p.Sites[s.Order]
	if _, name, several := strings.Cut(s.Name, "/"); several {
		return site.Stations[name]
	}
	return site.Station
}

func (n *Network) noAntenna(name string) error {
	return &Refusal{fmt.Sprintf("there is no antenna %.60q", name), known(slices.Sorted(maps.Keys(n.plan.Antennas)), "antenna")}
}
