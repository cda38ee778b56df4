package plan

import (
	"fmt"
	"strings"
)

// directional are the kinds of antenna that have a beam and so need a facing.
var directional = map[string]bool{"yagi": true, "datasheet": true, "cuts": true, "table": true}

func (c *checker) sites() {
	first := map[string]int{}
	for i, s := range c.Sites {
		path := fmt.Sprintf("sites[%d]", i)
		if j, dup := first[s.Name]; dup {
			c.wrong(path+".name", fmt.Sprintf("%q is the name of two sites", s.Name), fmt.Sprintf("the other stands in line %d", c.where[fmt.Sprintf("sites[%d].name", j)].line))
		}
		first[s.Name] = i
		if strings.Contains(s.Name, "/") || strings.Contains(s.Name, "..") {
			c.wrong(path+".name", fmt.Sprintf("%q has / or .. in it", s.Name), "they stand between site and station, and between the ends of a link")
		}
		c.site(path, s)
	}
}

func (c *checker) site(path string, s Site) {
	if _, err := s.At.coordinates(); err != nil {
		c.refuse(path+".at", err)
	}
	if s.GroundLevel != nil {
		c.within(path+".ground_level", float64(*s.GroundLevel), -500, 9000, "m")
	}
	if s.Mast != nil {
		c.mast(path+".mast", s.Mast)
	}
	if len(s.Stations) > 0 {
		if s.Radio != "" || s.Antenna != nil || s.Feeder != nil || s.Inserts != nil {
			c.wrong(path, "has stations and a radio, antenna, feeder or inserts beside them", "move them into the stations")
		}
		for name, st := range sorted(s.Stations) {
			if strings.Contains(name, "/") || strings.Contains(name, "..") {
				c.wrong(path+".stations."+name, "has / or .. in its name", "")
			}
			c.station(path+".stations."+name, s, st)
		}
		return
	}
	c.station(path, s, s.Station)
}

// maxMastWidthM is more than any mast measures that antennas hang beside.
const maxMastWidthM = 10.0

func (c *checker) mast(path string, m *Mast) {
	heightM, widthM := mastSize(m)
	c.within(path+".height", heightM, minAglM, maxAglM, "m")
	width := ".diameter"
	if m.Kind == "lattice" {
		width = ".width"
	}
	c.within(path+width, widthM, 0, maxMastWidthM, "m")
}

func (c *checker) station(path string, s Site, st Station) {
	if st.Radio != "" {
		refers(c, path+".radio", st.Radio, c.Radios, "radio")
	}
	if st.Antenna != nil {
		c.antennaUse(path+".antenna", s, *st.Antenna)
	}
	if st.Feeder != nil {
		refers(c, path+".feeder.use", st.Feeder.Use, c.Feeders, "feeder")
		c.within(path+".feeder.length", float64(st.Feeder.Length), 0, 2000, "m")
	}
	for i, in := range st.Inserts {
		c.insert(fmt.Sprintf("%s.inserts[%d]", path, i), in)
	}
}

// The heights above ground that an antenna may have, in metres.
const (
	minAglM = 0.1
	maxAglM = 1000.0
)

func (c *checker) antennaUse(path string, s Site, a AntennaUse) {
	known := refers(c, path+".use", a.Use, c.Antennas, "antenna")
	c.within(path+".above_ground", float64(a.AboveGround), minAglM, maxAglM, "m")
	if known && directional[c.Antennas[a.Use].Kind] && a.Facing == nil {
		c.wrong(path+".facing", "is missing", fmt.Sprintf(`a %s has a beam; write facing: "123 deg" or "toward SITE"`, c.Antennas[a.Use].Kind))
	}
	if a.Facing != nil && a.Facing.Site != "" {
		if c.siteIndex(a.Facing.Site) < 0 {
			c.wrong(path+".facing", fmt.Sprintf("there is no site %q", a.Facing.Site), knownSites(c.Plan))
		} else if a.Facing.Site == s.Name {
			c.wrong(path+".facing", "faces its own site", "")
		}
	} else if a.Facing != nil {
		c.within(path+".facing", a.Facing.BearingDeg, -360, 360, "deg")
	}
	if a.Polarization != nil {
		c.within(path+".polarization", a.Polarization.SlantDeg, -180, 180, "deg")
	}
	if a.Tilt != nil {
		c.within(path+".tilt", float64(*a.Tilt), -90, 90, "deg")
	}
	c.onMast(path, s, a)
}

// onMast checks the antenna's height against its mast: on top at its height or above, beside it
// not higher than its top.
func (c *checker) onMast(path string, s Site, a AntennaUse) {
	if s.Mast == nil {
		if a.Standoff != nil {
			c.wrong(path+".standoff", "there is no mast to stand off from", "describe the site's mast")
		}
		return
	}
	height, widthM := mastSize(s.Mast)
	switch {
	case a.Standoff == nil && float64(a.AboveGround) < height:
		c.wrong(path+".above_ground", fmt.Sprintf("%g m lies below the mast's top at %g m", float64(a.AboveGround), height), "an antenna beside its mast needs a standoff; one on top is at the mast's height or above")
	case a.Standoff != nil && float64(a.AboveGround) > height:
		c.wrong(path+".above_ground", fmt.Sprintf("%g m lies above the mast's top at %g m", float64(a.AboveGround), height), "an antenna on a standoff hangs beside its mast; leave standoff out for one on top")
	case a.Standoff != nil && float64(*a.Standoff) <= widthM/2:
		c.wrong(path+".standoff", fmt.Sprintf("%g m lies inside the mast", float64(*a.Standoff)), "it is from axis to axis")
	}
}

// mastSize returns the height of a mast and its diameter or face width, in metres; zero where
// the plan does not say.
func mastSize(m *Mast) (heightM, widthM float64) {
	switch spec := m.Spec.(type) {
	case *Pole:
		heightM = float64(spec.Height)
		if spec.Diameter != nil {
			widthM = float64(*spec.Diameter)
		}
	case *Lattice:
		heightM = float64(spec.Height)
		if spec.Width != nil {
			widthM = float64(*spec.Width)
		}
	}
	return heightM, widthM
}

func (c *checker) insert(path string, in Insert) {
	switch {
	case (in.Loss == nil) == (in.Gain == nil):
		c.wrong(path, "needs a loss or a gain", "")
	case in.Gain != nil && *in.Gain == 0:
		c.wrong(path, "is a preamplifier without gain", "a loss is written as loss")
	case in.Gain != nil && in.NoiseFigure == nil:
		c.wrong(path, "is a preamplifier without a noise_figure", "")
	case in.Gain != nil && !in.ReceiveOnly:
		c.wrong(path, "is a preamplifier and must be receive_only: true", "a transmitter cannot pass through it")
	case in.Loss != nil && in.NoiseFigure != nil:
		c.wrong(path, "has a loss and a noise_figure", "the noise of a loss follows from the loss")
	}
}

func (p *Plan) siteIndex(name string) int {
	for i := range p.Sites {
		if p.Sites[i].Name == name {
			return i
		}
	}
	return -1
}

func knownSites(p *Plan) string {
	names := make([]string, len(p.Sites))
	for i := range p.Sites {
		names[i] = p.Sites[i].Name
	}
	return known(names, "site")
}
