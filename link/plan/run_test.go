package plan

import (
	"context"
	"errors"
	"fmt"
	"math"
	"runtime"
	"strings"
	"testing"
)

func TestRun(t *testing.T) {
	n := flatNetwork(t, threeSites)
	done := 0
	r, err := n.Run(context.Background(), func() { done++ })
	if err != nil {
		t.Fatal(err)
	}
	if done != 2 || len(r.Links) != 2 || r.Title != "plan" {
		t.Errorf("%d done, %d links, title %q", done, len(r.Links), r.Title)
	}
	for i, l := range r.Links {
		if l.Link != n.Links[i] {
			t.Errorf("link %d is %s", i, l.Link.Title())
		}
	}
	if got := len(r.Links[0].Directions); got != 2 {
		t.Errorf("%d directions of the pair", got)
	}
	if got := len(r.Links[1].Directions); got != 1 {
		t.Errorf("%d directions of the one-way link", got)
	}
	names := ""
	for _, s := range r.Stations {
		names += s.Name + ", "
	}
	if names != "Base, East/up, East/down, South, " { // by site; of one site as the links name them
		t.Errorf("stations %s", names)
	}
}

// The ground's profile runs from the link's From, whichever end the plan lists first; its length is
// that of the geodesic: 8 km on the grid at UTM's scale factor of 0.9996 near the central meridian
// (in the mean of 500 to 508 km easting another 0.3e-6).
func TestProfileOfLink(t *testing.T) {
	r, err := flatNetwork(t, threeSites).Run(context.Background(), nil)
	if err != nil {
		t.Fatal(err)
	}
	pair, telemetry := r.Links[0].Profile, r.Links[1].Profile
	if want := 8 / 0.9996; math.Abs(pair.LengthKm()-want) > 1e-5 {
		t.Errorf("%.6f km, want %.6f", pair.LengthKm(), want)
	}
	if pair.AslM[0] != 104.5 || pair.AslM[len(pair.AslM)-1] != 100 {
		t.Errorf("heights at the ends %g and %g m", pair.AslM[0], pair.AslM[len(pair.AslM)-1])
	}
	if az := telemetry.AzDeg; math.Abs(az-45) > 0.1 { // from South north-east to East
		t.Errorf("azimuth %.3f from South", az)
	}
	if from := telemetry.Points[0]; from != r.Links[1].Link.From.At {
		t.Errorf("begins at %v", from)
	}
}

// One core or many: the same bits.
func TestRunOnAnyCores(t *testing.T) {
	run := func(cores int) string {
		defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(cores))
		r, err := flatNetwork(t, threeSites).Run(context.Background(), nil)
		if err != nil {
			t.Fatal(err)
		}
		text := ""
		for _, l := range r.Links {
			for _, b := range l.Directions {
				text += fmt.Sprintf("%x %x %x %v\n", b.MarginDB, b.ReceivedDBm, b.ChancePct, b.Lines)
			}
		}
		return text
	}
	if one, four := run(1), run(4); one != four {
		t.Errorf("one core:\n%s\nfour:\n%s", one, four)
	}
}

func TestRunStops(t *testing.T) {
	ctx, stop := context.WithCancel(context.Background())
	stop()
	if r, err := flatNetwork(t, threeSites).Run(ctx, nil); !errors.Is(err, context.Canceled) || r != nil {
		t.Errorf("got %v, %v", r, err)
	}
}

// Links without an answer are all told of, each at its place in the plan.
func TestRunErrors(t *testing.T) {
	text := strings.Replace(threeSites, `"100 MHz": "2 dB/100m", "400 MHz": "4 dB/100m"`, `"1 GHz": "7 dB/100m", "2 GHz": "10 dB/100m"`, 1) // too far from 155 MHz
	text = strings.Replace(text, "from: South,", "from: South, fade: \"1 dB\", channel: one, to: Base}\n  - {from: South,", 1)
	_, err := flatNetwork(t, text).Run(context.Background(), nil)
	var all Errors
	if !errors.As(err, &all) || len(all) != 2 {
		t.Fatalf("want two errors, got: %v", err)
	}
	for i, want := range []string{"plan.yaml:35:5: links[0]: Base to East/up: ", "plan.yaml:36:5: links[1]: South to Base: "} {
		if !strings.Contains(all[i].Error(), want) {
			t.Errorf("got %v, want %s", all[i], want)
		}
	}
}
