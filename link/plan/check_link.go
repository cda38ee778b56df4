package plan

import (
	"fmt"
	"strings"
)

func (c *checker) links() {
	first := map[[3]string]int{}
	names := map[string]bool{}
	for i, l := range c.Links.List {
		path := fmt.Sprintf("links[%d]", i)
		ends := [3]string{l.From, l.To, l.Channel}
		if j, dup := first[ends]; dup {
			c.wrong(path, "stands twice", fmt.Sprintf("the same link stands in line %d", c.where[fmt.Sprintf("links[%d]", j)].line))
		}
		first[ends] = i
		if l.Name != "" && names[l.Name] {
			c.wrong(path+".name", fmt.Sprintf("%q is the name of two links", l.Name), "")
		}
		names[l.Name] = true
		c.link(path, l)
	}
}

func (c *checker) link(path string, l Link) {
	from, okFrom := c.end(path+".from", l.From)
	to, okTo := c.end(path+".to", l.To)
	if okFrom && okTo {
		if site(l.From) == site(l.To) {
			c.wrong(path, "begins and ends at one site", "")
		}
		c.transmits(path+".from", l.From, from)
		if !l.OneWay {
			c.transmits(path+".to", l.To, to)
		}
	}
	if l.Channel == "" {
		c.wrong(path+".channel", "is missing", "the plan has several channels; name one")
	} else {
		refers(c, path+".channel", l.Channel, c.Channels, "channel")
	}
	for i, via := range l.Via {
		c.end(fmt.Sprintf("%s.via[%d]", path, i), via)
	}
	if _, own := c.where[path+".aim"]; own {
		c.aim(path+".aim", l.Aim)
	}
	if l.Fade == nil && *l.Aim.Availability > 50 && !methods[c.Method].fades {
		c.wrong(path+".fade", fmt.Sprintf("is missing: method %s does not compute the fading that %g %% availability asks for", c.Method, float64(*l.Aim.Availability)),
			`state it, as in fade: "10 dB", or set aim: {availability: "50 %"}`)
	}
}

// end finds the station that one end of a link names.
func (c *checker) end(path, name string) (Station, bool) {
	siteName, stationName, several := strings.Cut(name, "/")
	i := c.siteIndex(siteName)
	if i < 0 {
		c.wrong(path, fmt.Sprintf("there is no site %q", siteName), knownSites(c.Plan))
		return Station{}, false
	}
	s := c.Sites[i]
	switch {
	case several && len(s.Stations) == 0:
		c.wrong(path, fmt.Sprintf("site %q has no stations of its own names", siteName), fmt.Sprintf("write %q", siteName))
	case !several && len(s.Stations) > 0:
		c.wrong(path, fmt.Sprintf("site %q has several stations", siteName), fmt.Sprintf(`write "%s/STATION" with one of its stations`, siteName))
	case several:
		if refers(c, path, stationName, s.Stations, "station") {
			return s.Stations[stationName], c.complete(path, name, s.Stations[stationName])
		}
	default:
		return s.Station, c.complete(path, name, s.Station)
	}
	return Station{}, false
}

// complete tells whether a station can be the end of a link.
func (c *checker) complete(path, name string, st Station) bool {
	switch {
	case st.Radio == "":
		c.wrong(path, fmt.Sprintf("%q has no radio", name), "name one at the site")
	case st.Antenna == nil:
		c.wrong(path, fmt.Sprintf("%q has no antenna", name), "describe one at the site")
	default:
		_, known := c.Radios[st.Radio]
		return known
	}
	return false
}

func (c *checker) transmits(path, name string, st Station) {
	if c.Radios[st.Radio].Power == nil {
		c.wrong(path, fmt.Sprintf("%q transmits on this link, but radio %q has no power", name, st.Radio), "state its power, or make the link one_way")
	}
}

func site(end string) string {
	name, _, _ := strings.Cut(end, "/")
	return name
}

func (c *checker) coverage(path string, v Coverage) {
	c.end(path+".site", v.Site)
	refers(c, path+".mobile.radio", v.Mobile.Radio, c.Radios, "radio")
	c.within(path+".range", float64(v.Range)/1000, 1, 150, "km")
	if v.Cell != nil {
		c.within(path+".cell", float64(*v.Cell), 5, 500, "m")
	}
	if v.Locations != nil {
		c.within(path+".locations", float64(*v.Locations), 1, 99, "%")
	}
	if v.Availability != nil {
		c.within(path+".availability", float64(*v.Availability), 50, 99.9, "%")
	}
	if v.Channel != "" {
		refers(c, path+".channel", v.Channel, c.Channels, "channel")
	}
	for i := 1; i < len(v.Bands); i++ {
		if v.Bands[i] <= v.Bands[i-1] {
			c.wrong(fmt.Sprintf("%s.bands[%d]", path, i), "bands must grow", "")
		}
	}
}

func (c *checker) weigh(path string, w Weigh) {
	c.end(path+".site", w.Site)
	for i, name := range w.Antennas {
		refers(c, fmt.Sprintf("%s.antennas[%d]", path, i), name, c.Antennas, "antenna")
	}
	if w.Heights[1] < w.Heights[0] {
		c.wrong(path+".heights", "run downwards", "write from, to, step")
	}
}
