package plan

import (
	"fmt"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/noise"
	"fellreach/terrain/raster"
)

// addStations resolves every station that has a radio and an antenna.
func (n *Network) addStations(c *checker) {
	for i, s := range c.Sites {
		path := fmt.Sprintf("sites[%d]", i)
		if len(s.Stations) == 0 {
			n.addStation(c, path, s.Name, i, s.Station)
		}
		for name, st := range sorted(s.Stations) {
			n.addStation(c, path+".stations."+name, s.Name+"/"+name, i, st)
		}
	}
}

func (n *Network) addStation(c *checker, path, name string, siteIndex int, st Station) {
	if st.Radio == "" || st.Antenna == nil {
		return
	}
	use := st.Antenna
	if _, known := n.designs[use.Use]; !known {
		d, err := c.built(use.Use)
		if err != nil {
			c.refuse("antennas."+use.Use, err)
		}
		n.designs[use.Use] = d
	}
	s, design := c.Sites[siteIndex], n.designs[use.Use]
	out := &link.Station{
		Name: name, Order: siteIndex, At: n.places[siteIndex],
		ClearingM:     float64(*s.Clearing),
		Surroundings:  c.surroundings(fmt.Sprintf("sites[%d]", siteIndex), s),
		Noise:         c.noise(siteIndex),
		Radio:         c.resolveRadio(st.Radio),
		Antenna:       design.Design,
		Match:         design.match,
		HarnessDB:     design.harnessDB,
		AntennaSource: c.source("antennas." + use.Use),
		AglM:          float64(use.AboveGround),
		Mount:         n.mount(siteIndex, *use),
	}
	if s.GroundLevel != nil {
		level := float64(*s.GroundLevel)
		out.GroundAslM = &level
	}
	if s.Mast != nil {
		heightM, widthM := mastSize(s.Mast)
		out.MastDiameterM, out.MastAboveM = widthM, heightM-out.AglM
	}
	if use.Standoff != nil {
		out.StandoffM = float64(*use.Standoff)
	}
	c.feed(out, path, st)
	n.Stations[name] = out
}

// noise returns what a site hears: its own statement, or the plan's.
func (c *checker) noise(siteIndex int) link.Noise {
	z, path := c.Noise, "noise"
	if own := c.Sites[siteIndex].Noise; own != nil {
		z, path = own, fmt.Sprintf("sites[%d].noise", siteIndex)
	}
	out := link.Noise{Environment: noise.Environment(z.Environment), Source: c.source(path)}
	if _, stated := c.where[path]; !stated {
		out.Source = "assumed"
	}
	if m := z.Measured; m != nil {
		out.MeasuredDBm, out.MeasuredInHz = float64(m.Measured), float64(m.Bandwidth)
	}
	return out
}

func (c *checker) surroundings(path string, s Site) link.Surroundings {
	if s.Surroundings == nil {
		return link.Surroundings{}
	}
	out := link.Surroundings{Source: c.source(path + ".surroundings")}
	switch around := s.Surroundings.Spec.(type) {
	case *Woodland:
		out.WoodlandM = float64(around.Depth)
	case *Built:
		out.BuiltM, out.StreetM = float64(around.Height), float64(around.Street)
	}
	return out
}

// mount returns how an antenna hangs: facing a bearing, a site, or north.
func (n *Network) mount(siteIndex int, use AntennaUse) antenna.Mount {
	var m antenna.Mount
	if f := use.Facing; f != nil {
		m.FacingDeg = f.BearingDeg
		if f.Site != "" {
			_, m.FacingDeg, _ = raster.Inverse(n.places[siteIndex], n.places[n.plan.siteIndex(f.Site)])
		}
	}
	if use.Tilt != nil {
		m.TiltDeg = float64(*use.Tilt)
	}
	if use.Polarization != nil {
		m.RollDeg = use.Polarization.SlantDeg
	}
	return m
}

// feed fills in what lies between a station's radio and its antenna.
func (c *checker) feed(out *link.Station, path string, st Station) {
	for i, in := range st.Inserts {
		out.Inserts = append(out.Inserts, in.resolve(c.source(fmt.Sprintf("%s.inserts[%d]", path, i))))
	}
	if f := st.Feeder; f != nil {
		out.Run = antenna.Run{Feeder: c.Feeders[f.Use].resolve(f.Use), LengthM: float64(f.Length)}
		out.RunSource = c.source("feeders." + f.Use)
		if k := f.Connectors; k != nil {
			out.Run.ConnectorCount, out.Run.ConnectorLossDB = k.Count, float64(k.LossEach)
			out.ConnectorSource = c.source(path + ".feeder.connectors")
		}
		if err := out.Run.Feeder.Check(); err != nil {
			c.refuse("feeders."+f.Use, err)
		}
	}
	out.MatchSource = c.source("antennas." + st.Antenna.Use + ".match")
	out.HarnessSource = c.source("antennas." + st.Antenna.Use + ".harness")
}

func (f Feeder) resolve(name string) antenna.Feeder {
	out := antenna.Feeder{Name: name, ImpedanceOhm: float64(f.Impedance), VelocityFactor: *f.VelocityFactor}
	for _, p := range f.Loss {
		out.Loss = append(out.Loss, antenna.LossPoint{FreqHz: p.FreqHz, DBPerM: p.DBPerM})
	}
	return out
}

func (in Insert) resolve(source string) link.Insert {
	out := link.Insert{Name: in.Name, ReceiveOnly: in.ReceiveOnly, AtMast: in.Where == "mast", Source: source}
	if in.Loss != nil {
		out.LossDB = float64(*in.Loss)
	}
	if in.Gain != nil {
		out.GainDB, out.FigureDB = float64(*in.Gain), float64(*in.NoiseFigure)
	}
	return out
}

// resolveRadio returns the radio of a name with the sources of its figures.
func (c *checker) resolveRadio(name string) link.Radio {
	r, path := c.Radios[name], "radios."+name
	out := link.Radio{Name: name, DutyPct: float64(*r.Duty)}
	if r.Power != nil {
		out.PowerDBm, out.PowerSource = float64(*r.Power), c.source(path+".power")
	}
	need := &out.Needs
	if r.NoiseFigure != nil {
		need.FigureDB = float64(*r.NoiseFigure)
	}
	if r.NoiseBandwidth != nil {
		need.BandwidthHz = float64(*r.NoiseBandwidth)
	}
	if r.Capture != nil {
		need.CaptureDB = float64(*r.Capture)
	}
	if r.Sensitivity != nil {
		need.Stated, need.SensitivityDBm, need.Source = true, float64(*r.Sensitivity), c.source(path+".sensitivity")
		if _, stated := c.where[path+".noise_figure"]; !stated {
			need.Source += fmt.Sprintf("; noise figure %g dB assumed", need.FigureDB)
		}
	} else {
		need.RequiredSNRDB, need.Source = float64(*r.RequiredSNR), c.source(path)
	}
	return out
}
