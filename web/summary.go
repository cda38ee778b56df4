package web

import (
	"maps"
	"slices"

	"fellreach/link"
	"fellreach/link/plan"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// A PlanSummary is what a plan holds, its names resolved and its quantities in plain units.
type PlanSummary struct {
	Title    string           `json:"title"`
	Method   string           `json:"method"`
	Sites    []SiteSummary    `json:"sites"`
	Links    []LinkSummary    `json:"links"`
	Channels []ChannelSummary `json:"channels"`
	Antennas []AntennaSummary `json:"antennas"`
	Radios   []string         `json:"radios"`
	Feeders  []string         `json:"feeders"`
	Coverage []CoverSummary   `json:"coverage" doc:"maps that the plan asks for"`
	Rasters  []RasterSummary  `json:"rasters" doc:"elevation in its order, then cover"`
}

// A PlaceText is a place in the three notations that a plan takes.
type PlaceText struct {
	Lon     float64 `json:"lon"`
	Lat     float64 `json:"lat"`
	Decimal string  `json:"decimal" example:"47.52310 N, 20.11800 W"`
	DMS     string  `json:"dms"`
	UTM     string  `json:"utm"`
}

// A SiteSummary is a site with its stations.
type SiteSummary struct {
	Name     string           `json:"name"`
	At       string           `json:"at" doc:"the place as the plan writes it"`
	Place    PlaceText        `json:"place"`
	GroundM  *float64         `json:"ground_m" doc:"above sea level; null where the rasters hold no height"`
	Surveyed bool             `json:"surveyed" doc:"the plan states the ground's height"`
	Mast     *MastSummary     `json:"mast,omitempty"`
	Stations []StationSummary `json:"stations"`
}

// A MastSummary is a mast; the width is that of a face or the diameter, 0 where it is not known.
type MastSummary struct {
	Kind    string  `json:"kind" enum:"pole,lattice"`
	HeightM float64 `json:"height_m"`
	WidthM  float64 `json:"width_m"`
}

// A StationSummary is a radio with its antenna and feeder.
type StationSummary struct {
	Name          string   `json:"name" doc:"as links name it"`
	Path          []string `json:"path" doc:"where the plan holds it, to be prolonged for an edit" example:"[\"sites\",\"Gauge 3\"]"`
	Radio         string   `json:"radio"`
	Antenna       string   `json:"antenna"`
	AboveGroundM  float64  `json:"above_ground_m"`
	FacingDeg     float64  `json:"facing_deg"`
	FacingSite    string   `json:"facing_site,omitempty"`
	TiltDeg       float64  `json:"tilt_deg"`
	SlantDeg      float64  `json:"slant_deg" doc:"polarization, from upright"`
	StandoffM     float64  `json:"standoff_m" doc:"0 for an antenna on top"`
	Feeder        string   `json:"feeder,omitempty"`
	FeederLengthM float64  `json:"feeder_length_m"`
}

// A LinkSummary is a link as the plan asks for it.
type LinkSummary struct {
	Name    string `json:"name,omitempty"`
	From    string `json:"from"`
	To      string `json:"to"`
	Channel string `json:"channel"`
	OneWay  bool   `json:"one_way"`
}

// A ChannelSummary is a channel.
type ChannelSummary struct {
	Name        string  `json:"name"`
	OutHz       float64 `json:"out_hz"`
	BackHz      float64 `json:"back_hz"`
	BandwidthHz float64 `json:"bandwidth_hz"`
}

// An AntennaSummary names an antenna.
type AntennaSummary struct {
	Name string `json:"name"`
	Kind string `json:"kind"`
}

// A CoverSummary is an entry of the plan's coverage list.
type CoverSummary struct {
	Site    string  `json:"site"`
	RangeKm float64 `json:"range_km"`
}

// A RasterSummary is a raster of the ground.
type RasterSummary struct {
	File   string     `json:"file" doc:"as the plan names it"`
	CRS    string     `json:"crs"`
	Cols   int        `json:"cols"`
	Rows   int        `json:"rows"`
	CellXM float64    `json:"cell_x_m"`
	CellYM float64    `json:"cell_y_m"`
	LonLat [4]float64 `json:"lon_lat" nullable:"false" doc:"west, south, east, north"`
}

func summaryOf(n *plan.Network) PlanSummary {
	p := n.Plan()
	out := PlanSummary{
		Title: p.Title, Method: p.Method, Sites: []SiteSummary{}, Links: []LinkSummary{}, Coverage: []CoverSummary{}, Channels: []ChannelSummary{}, Antennas: []AntennaSummary{},
		Radios: slices.AppendSeq([]string{}, maps.Keys(p.Radios)), Feeders: slices.AppendSeq([]string{}, maps.Keys(p.Feeders)), Rasters: rastersOf(n),
	}
	slices.Sort(out.Radios)
	slices.Sort(out.Feeders)
	for i := range p.Sites {
		out.Sites = append(out.Sites, siteOf(n, i))
	}
	for _, l := range p.Links.List {
		out.Links = append(out.Links, LinkSummary{l.Name, l.From, l.To, l.Channel, l.OneWay})
	}
	for _, c := range p.Coverage {
		out.Coverage = append(out.Coverage, CoverSummary{c.Site, float64(c.Range) / 1000})
	}
	for _, name := range slices.Sorted(maps.Keys(p.Channels)) {
		c := p.Channel(name)
		out.Channels = append(out.Channels, ChannelSummary{name, c.OutHz, c.BackHz, c.BandwidthHz})
	}
	for _, name := range slices.Sorted(maps.Keys(p.Antennas)) {
		out.Antennas = append(out.Antennas, AntennaSummary{name, p.Antennas[name].Kind})
	}
	return out
}

func placeText(p orb.Point) PlaceText {
	return PlaceText{p.Lon(), p.Lat(), terrain.FormatDecimal(p), terrain.FormatDMS(p), raster.UTM(p)}
}

func siteOf(n *plan.Network, i int) SiteSummary {
	s, place := n.Plan().Sites[i], n.Place(i)
	out := SiteSummary{Name: s.Name, At: s.At.String(), Place: placeText(place), Stations: []StationSummary{}}
	if s.GroundLevel != nil {
		level := float64(*s.GroundLevel)
		out.GroundM, out.Surveyed = &level, true
	} else if level, err := n.Ground.HeightAslM(place); err == nil {
		out.GroundM = &level
	}
	if s.Mast != nil {
		heightM, widthM := s.MastSize()
		out.Mast = &MastSummary{s.Mast.Kind, heightM, widthM}
	}
	path := []string{"sites", s.Name}
	if st := n.Stations[s.Name]; st != nil && len(s.Stations) == 0 {
		out.Stations = append(out.Stations, stationOf(st, s.Station, path))
	}
	for _, name := range slices.Sorted(maps.Keys(s.Stations)) {
		if st := n.Stations[s.Name+"/"+name]; st != nil {
			out.Stations = append(out.Stations, stationOf(st, s.Stations[name], append(slices.Clone(path), "stations", name)))
		}
	}
	return out
}

func stationOf(st *link.Station, written plan.Station, path []string) StationSummary {
	out := StationSummary{
		Name: st.Name, Path: path, Radio: written.Radio, Antenna: written.Antenna.Use, AboveGroundM: st.AglM,
		FacingDeg: st.Mount.FacingDeg, TiltDeg: st.Mount.TiltDeg, SlantDeg: st.Mount.RollDeg, StandoffM: st.StandoffM, FeederLengthM: st.Run.LengthM,
	}
	if f := written.Antenna.Facing; f != nil {
		out.FacingSite = f.Site
	}
	if written.Feeder != nil {
		out.Feeder = written.Feeder.Use
	}
	return out
}

// rastersOf lists the rasters under the names that the plan gives them.
func rastersOf(n *plan.Network) []RasterSummary {
	list := []RasterSummary{}
	names := n.Plan().Files()
	for i, in := range n.Ground.Files() {
		list = append(list, RasterSummary{names[i].Path, in.CRS, in.Cols, in.Rows, in.CellXM, in.CellYM, in.LonLat})
	}
	return list
}
