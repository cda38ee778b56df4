package coverage

import (
	"strings"
	"time"
	"unicode"
)

// A Site is one map that is asked for.
type Site struct {
	Name string // of the station, as the plan has it
	Task Task
	// BandsDB are the margins at which bands begin, growing. AimDB is the margin from which on a cell
	// counts as covered.
	BandsDB []float64
	AimDB   float64
}

// slug is the site's name as file names have it: lower case, with dashes.
func (s *Site) slug() string {
	var b strings.Builder
	dash := false
	for _, r := range strings.ToLower(s.Name) {
		if unicode.IsLetter(r) || unicode.IsDigit(r) {
			if dash && b.Len() > 0 {
				b.WriteByte('-')
			}
			b.WriteRune(r)
			dash = false
			continue
		}
		dash = true
	}
	return b.String()
}

// A SiteReport is what cover.json says of a site.
type SiteReport struct {
	Site      string  `json:"site"`
	FreqHz    float64 `json:"frequency_hz"`
	RangeKm   float64 `json:"range_km"`
	CellM     float64 `json:"cell_m"`
	Cells     int     `json:"cells"`
	VoidCells int     `json:"void_cells"`
	Radials   int     `json:"radials"`
	Seconds   float64 `json:"seconds"`
	Bands     []Band  `json:"bands"`
	Check     Check   `json:"check"`
}

// A NetworkReport is what cover.json says of all sites together.
type NetworkReport struct {
	Sites   []string `json:"sites"` // in the order of their numbers in the layer of serving sites, from 1 on
	Bands   []Band   `json:"bands"` // of the best margin
	Covered []Share  `json:"covered"`
}

// A Share is the area in which so many sites reach their aim.
type Share struct {
	Sites   int     `json:"sites"`
	AreaKm2 float64 `json:"area_km2"`
}

// A Report is cover.json.
type Report struct {
	Title   string         `json:"title"`
	Sites   []SiteReport   `json:"sites"`
	Network *NetworkReport `json:"network,omitempty"`
}

func (s *Site) report(m *Map, bands []Band) SiteReport {
	return SiteReport{
		Site: s.Name, FreqHz: s.Task.Link.Channel.OutHz, RangeKm: s.Task.RangeM / 1000, CellM: s.Task.CellM,
		Cells: m.Cells, VoidCells: m.VoidCells, Radials: m.Radials, Seconds: m.Took.Round(time.Millisecond).Seconds(),
		Bands: bands, Check: m.Check,
	}
}
