package plan

import (
	"math"
	"slices"
	"strings"
	"testing"

	"fellreach/link"
)

const threeMaps = `coverage:
  - {site: Base, channel: pair, range: "25 km", cell: "20 m", locations: "90 %", availability: "99 %", mobile: {kind: vehicle, radio: base, antenna_height: "2 m", gain: "-3 dBi", body_loss: "4 dB", penetration_loss: "6 dB", fade: "3 dB"}, bands: ["-3 dB", "5 dB"]}
  - {site: East/up, channel: one, range: "5 km", mobile: {radio: ear, antenna_height: "1.5 m"}}
`

// Every figure of an entry is in its place, what is left out has its default.
func TestCoverageSites(t *testing.T) {
	n := flatNetwork(t, threeSites+threeMaps)
	sites, err := n.CoverageSites("")
	if err != nil {
		t.Fatal(err)
	}
	a, b := sites[0], sites[1]
	names := func(l *link.Link) (list []string) {
		for _, a := range l.Allowances {
			list = append(list, a.Name)
		}
		return list
	}
	for what, holds := range map[string]bool{
		"name":         a.Name == "Base" && b.Name == "East/up",
		"range":        a.Task.RangeM == 25000 && b.Task.RangeM == 5000,
		"cell":         a.Task.CellM == 20 && b.Task.CellM == n.Ground.StepM(),
		"step":         a.Task.StepM == n.Ground.StepM(),
		"locations":    a.Task.LocationsPct == 90 && b.Task.LocationsPct == 50,
		"availability": a.Task.Link.Aim.AvailabilityPct == 99 && b.Task.Link.Aim.AvailabilityPct == 95,
		"bands":        slices.Equal(a.BandsDB, []float64{-3, 5}) && slices.Equal(b.BandsDB, []float64{0, 4}),
		"aim":          a.AimDB == 4,
		"channel":      a.Task.Link.Channel.OutHz == 155.2e6 && a.Task.Link.Channel.BackHz == 151.1e6 && b.Task.Link.Channel.OutHz == 160e6,
		"station":      a.Task.Link.From.AglM == 15 && *a.Task.Link.From.GroundAslM == 104.5,
		"mobile":       a.Task.Link.To.Name == "vehicle" && a.Task.Link.To.AglM == 2 && b.Task.Link.To.Name == "mobile",
		"far end last": a.Task.Link.To.Order == math.MaxInt,
		"allowances":   slices.Equal(names(a.Task.Link), []string{"body", "penetration", "small-scale fading"}) && len(b.Task.Link.Allowances) == 0,
		"one way":      !a.Task.Link.OneWay && b.Task.Link.OneWay, // the radio "ear" has no power
	} {
		if !holds {
			t.Errorf("%s is wrong: %+v, %+v", what, a.Task.Link, b.Task.Link)
		}
	}
	if one, err := n.CoverageSites("East/up"); err != nil || len(one) != 1 || one[0].Name != "East/up" {
		t.Errorf("one site: %v, %v", one, err)
	}
	_, err = n.CoverageSites("West")
	if err == nil || !strings.Contains(err.Error(), `no coverage of "West"`) || !strings.Contains(err.Error(), "East/up") {
		t.Errorf("unknown site: %v", err)
	}
}

func TestCoverageMistakes(t *testing.T) {
	for _, tc := range []struct{ entry, says string }{
		{`{site: East/down, channel: one, range: "5 km", mobile: {radio: base, antenna_height: "1.5 m"}}`, `the radio of "East/down" has no power`},
		{`{site: Base, range: "5 km", mobile: {radio: base, antenna_height: "1.5 m"}}`, "names no channel"},
	} {
		n := flatNetwork(t, threeSites+"coverage: ["+tc.entry+"]\n")
		if _, err := n.CoverageSites(""); err == nil || !strings.Contains(err.Error(), tc.says) {
			t.Errorf("%s: error %v, want %q", tc.entry, err, tc.says)
		}
	}
	if _, err := flatNetwork(t, threeSites).CoverageSites(""); err == nil || !strings.Contains(err.Error(), "asks for no coverage") {
		t.Errorf("no coverage: %v", err)
	}
}
