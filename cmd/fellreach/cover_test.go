package main

import (
	"encoding/json"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/terrain/raster"
)

// coverPlan is the small plan with a map of A.
func coverPlan(t *testing.T) (folder string) {
	t.Helper()
	folder = t.TempDir()
	ground(func(*raster.GeoTIFF) {})(t, folder)
	text := strings.Replace(smallPlan, "method: p526\n", "", 1) +
		`coverage: [{site: A, range: "2 km", cell: "50 m", locations: "90 %", mobile: {kind: handheld, radio: r, antenna_height: "1.5 m", gain: "-3 dBi", body_loss: "4 dB"}, bands: ["0 dB", "10 dB"]}]` + "\n"
	write(t, folder, "plan.yaml", text)
	return folder
}

func TestCover(t *testing.T) {
	folder := coverPlan(t)
	out := filepath.Join(folder, "out")
	a := fellreach("cover", filepath.Join(folder, "plan.yaml"), "-o", out)
	if a.status != 0 || !strings.Contains(a.out, "check of 1") || !strings.Contains(a.out, "written to "+out) {
		t.Fatalf("status %d\n%s%s", a.status, a.out, a.err)
	}
	data, err := os.ReadFile(filepath.Join(out, "cover.json"))
	if err != nil {
		t.Fatal(err)
	}
	var report struct {
		Sites []struct {
			Site  string
			Cells int
			Bands []struct {
				FromDB  *float64 `json:"from_db"`
				AreaKm2 *float64 `json:"area_km2"`
			}
			VoidCells *int `json:"void_cells"`
			Radials   int
			Seconds   *float64
			Check     struct {
				Samples      int
				SweepMaxDB   *float64 `json:"sweep_max_db"`
				CellMedianDB *float64 `json:"cell_median_db"`
				CellP95DB    *float64 `json:"cell_p95_db"`
				CellMaxDB    *float64 `json:"cell_max_db"`
			}
		}
	}
	if err := json.Unmarshal(data, &report); err != nil {
		t.Fatal(err)
	}
	s := report.Sites[0]
	if s.Site != "A" || s.Cells < 4900 || s.Radials < 200 || *s.VoidCells != 0 || len(s.Bands) != 2 || *s.Bands[1].FromDB != 10 ||
		s.Check.Samples < 1000 || *s.Check.SweepMaxDB > 1e-6 || s.Check.CellMedianDB == nil || s.Check.CellP95DB == nil || s.Check.CellMaxDB == nil || s.Seconds == nil {
		t.Errorf("cover.json: %s", data)
	}
	// The ground is flat: hardly any sampling error, and the whole circle of 12.57 km2 within 10 dB.
	if *s.Check.CellMaxDB > 0.1 || *s.Bands[0].AreaKm2+*s.Bands[1].AreaKm2 > 12.6 {
		t.Errorf("flat ground: %s", data)
	}
}

func TestCoverOnlyLoss(t *testing.T) {
	folder := coverPlan(t)
	out := filepath.Join(folder, "out")
	if a := fellreach("cover", filepath.Join(folder, "plan.yaml"), "--site", "A", "--only", "loss", "--compress", "small", "--quality", "fine", "-o", out); a.status != 0 {
		t.Fatalf("status %d\n%s%s", a.status, a.out, a.err)
	}
	files, _ := filepath.Glob(filepath.Join(out, "[^.]*"))
	if len(files) != 2 {
		t.Errorf("files %v, want cover.json and loss-a.tif", files)
	}
}

func TestCoverAlong(t *testing.T) {
	folder := coverPlan(t)
	track := filepath.Join(folder, "track.geojson")
	if err := os.WriteFile(track, []byte(`{"type":"LineString","coordinates":[[9.99,50.01],[10.01,50.01]]}`), 0o644); err != nil {
		t.Fatal(err)
	}
	out := filepath.Join(folder, "ride")
	a := fellreach("cover", filepath.Join(folder, "plan.yaml"), "--along", track, "-o", out)
	if a.status != 0 || !strings.Contains(a.out, "km closes with 6 dB") {
		t.Fatalf("status %d\n%s%s", a.status, a.out, a.err)
	}
	for name, has := range map[string]string{"along.csv": "distance_m,lon,lat,best_margin_db", "along.geojson": `"margin_db"`, "along.svg": "</svg>"} {
		if data, err := os.ReadFile(filepath.Join(out, name)); err != nil || !strings.Contains(string(data), has) {
			t.Errorf("%s: %v, lacks %q", name, err, has)
		}
	}
}

func TestCoverMistakes(t *testing.T) {
	folder := coverPlan(t)
	plan, out := filepath.Join(folder, "plan.yaml"), filepath.Join(folder, "out")
	for _, tc := range []struct {
		args   []string
		status int
		says   string
	}{
		{[]string{"cover", plan}, 2, "-o"},
		{[]string{"cover", plan, "-o", out, "--only", "lose"}, 2, `"lose" is none of loss, margin`},
		{[]string{"cover", plan, "-o", out, "--compress", "tiny"}, 2, "fast, small"},
		{[]string{"cover", plan, "-o", out, "--quality", "best"}, 2, "normal, fine"},
		{[]string{"cover", plan, "-o", out, "--site", "Z"}, 2, `no coverage of "Z"`},
		{[]string{"cover", plan, "-o", out, "--along", plan}, 1, "neither GeoJSON nor GPX"},
	} {
		a := fellreach(tc.args...)
		if a.status != tc.status || !strings.Contains(a.err, tc.says) || a.out != "" {
			t.Errorf("%v: status %d, %q; want %d, %q", tc.args[2:], a.status, a.err, tc.status, tc.says)
		}
	}
	if _, err := os.Stat(out); !os.IsNotExist(err) {
		t.Error("a mistake left a folder behind")
	}
}
