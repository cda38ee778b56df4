package plan

import (
	"fmt"
	"math"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/coverage"
	"fellreach/link/noise"
)

// CoverageSites resolves the plan's coverage, in its order; a site that is not empty picks the
// entries of one.
func (n *Network) CoverageSites(site string) ([]coverage.Site, error) {
	c := &checker{Plan: n.plan}
	var sites []coverage.Site
	for i, v := range n.plan.Coverage {
		if site == "" || site == v.Site {
			sites = append(sites, n.coverageSite(c, fmt.Sprintf("coverage[%d]", i), v))
		}
	}
	switch {
	case len(c.errs) > 0:
		return nil, c.errs.sorted()
	case len(sites) > 0:
		return sites, nil
	case len(n.plan.Coverage) == 0:
		return nil, &Refusal{"the plan asks for no coverage", `add coverage: [{site: ..., range: "25 km", mobile: {radio: ..., antenna_height: "1.5 m"}}]`}
	}
	var names []string
	for _, v := range n.plan.Coverage {
		names = append(names, v.Site)
	}
	return nil, &Refusal{fmt.Sprintf("the plan asks for no coverage of %q", site), known(names, "site")}
}

func (n *Network) coverageSite(c *checker, path string, v Coverage) coverage.Site {
	from := *n.Stations[v.Site]
	name := n.coverageChannel(c, path, v)
	channel := c.Channels[name].resolve(name)
	if from.CutForHz == 0 {
		from.CutForHz = channel.CentreHz()
	}
	m := coverage.Site{
		Name: v.Site,
		Task: coverage.Task{
			Conditions: n.Conditions, LocationsPct: 50, RangeM: float64(v.Range),
			CellM: n.Ground.StepM(), StepM: n.Ground.StepM(), BridgeM: float64(*n.plan.Ground.BridgeVoids),
		},
	}
	if v.Cell != nil {
		m.Task.CellM = float64(*v.Cell)
	}
	if v.Locations != nil {
		m.Task.LocationsPct = float64(*v.Locations)
	}
	to := n.mobile(c, path+".mobile", v.Mobile)
	aim := link.Aim{AvailabilityPct: float64(*c.Aim.Availability)}
	if v.Availability != nil {
		aim.AvailabilityPct = float64(*v.Availability)
	}
	if c.Aim.Margin != nil {
		aim.MarginDB = float64(*c.Aim.Margin)
	}
	m.AimDB = aim.MarginDB
	for _, b := range v.Bands {
		m.BandsDB = append(m.BandsDB, float64(b))
	}
	if len(m.BandsDB) == 0 {
		m.BandsDB = []float64{0}
		if aim.MarginDB > 0 {
			m.BandsDB = append(m.BandsDB, aim.MarginDB)
		}
	}
	if c.Radios[c.stationOf(v.Site).Radio].Power == nil {
		c.wrong(path+".site", fmt.Sprintf("the radio of %q has no power", v.Site), "state its power")
	}
	m.Task.Link = &link.Link{
		From: &from, To: to, Channel: channel, Aim: aim, OneWay: c.Radios[v.Mobile.Radio].Power == nil,
		Allowances: mobileAllowances(c, path+".mobile", v.Mobile),
	}
	return m
}

// coverageChannel is the channel of an entry, or the plan's only one.
func (n *Network) coverageChannel(c *checker, path string, v Coverage) string {
	if v.Channel != "" {
		return v.Channel
	}
	if len(c.Channels) > 1 {
		c.wrong(path, "names no channel, and the plan has several", "add channel")
	}
	for name := range sorted(c.Channels) {
		return name
	}
	return ""
}

// stationOf is the station that a name of links stands for.
func (c *checker) stationOf(name string) Station {
	s := c.Sites[c.siteIndex(site(name))]
	if len(s.Stations) == 0 {
		return s.Station
	}
	return s.Stations[name[len(s.Name)+1:]]
}

// mobile is the far end of a map: everywhere in turn, hearing what the plan says is heard.
func (n *Network) mobile(c *checker, path string, v Mobile) *link.Station {
	gainDBi := 0.0
	if v.Gain != nil {
		gainDBi = float64(*v.Gain)
	}
	design, err := antenna.Isotropic(gainDBi, antenna.Port{})
	if err != nil {
		c.refuse(path, err)
	}
	design.Name = v.Kind
	out := &link.Station{
		Name: v.Kind, Order: math.MaxInt, AglM: float64(v.AntennaHeight),
		Radio: c.resolveRadio(v.Radio), Antenna: design, AntennaSource: c.source(path),
		Noise: link.Noise{Environment: noise.Environment(c.Noise.Environment), Source: c.source("noise")},
	}
	if out.Name == "" {
		out.Name = "mobile"
	}
	if m := c.Noise.Measured; m != nil {
		out.Noise.MeasuredDBm, out.Noise.MeasuredInHz = float64(m.Measured), float64(m.Bandwidth)
	}
	return out
}

func mobileAllowances(c *checker, path string, v Mobile) (list []link.Allowance) {
	for _, a := range []struct {
		name string
		loss *Loss
		key  string
	}{{"body", v.BodyLoss, ".body_loss"}, {"penetration", v.PenetrationLoss, ".penetration_loss"}, {"small-scale fading", v.Fade, ".fade"}} {
		if a.loss != nil {
			list = append(list, link.Allowance{Name: a.name, LossDB: float64(*a.loss), Source: c.source(path + a.key)})
		}
	}
	return list
}
