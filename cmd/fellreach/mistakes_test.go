package main

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"fellreach/terrain"
	"fellreach/terrain/raster"
)

// smallPlan is a plan without a mistake, on a ground.tif that is flat at 100 m over 0.2 degrees
// around 50 N, 10 E.
const smallPlan = `format: 1
ground: {elevation: {files: [ground.tif]}}
channels: {c: {frequency: "151.5 MHz", bandwidth: "12.5 kHz"}}
radios: {r: {power: "5 W", sensitivity: "-117 dBm"}}
antennas: {a: {kind: omni, gain: "2 dBi", impedance: "50 ohm"}}
sites:
  - {name: A, at: "50.02 N, 10.00 E", radio: r, antenna: {use: a, above_ground: "15 m"}}
  - {name: B, at: "49.98 N, 10.01 E", radio: r, antenna: {use: a, above_ground: "16 m"}}
  - {name: C, at: "49.98 N, 9.99 E", radio: r, antenna: {use: a, above_ground: "17 m"}}
links: [{from: A, to: B, fade: "10 dB"}]
method: p526
`

// smallProfile is a profile without a mistake.
const smallProfile = "d_km,h_m\n0,100\n1,120\n2,110\n"

// A mistake is what a user does wrong, and how the program answers.
type mistake struct {
	name string
	// prepare spoils the folder that holds plan.yaml, ground.tif and profile.csv; nil leaves it.
	prepare func(t *testing.T, folder string)
	// args is the command line, FOLDER standing for the folder, _ for a space within an argument.
	args   string
	status int
	want   string // in the error, FOLDER/ left out of it
}

// edit spoils the plan: the first of each pair of texts becomes the second, once.
func edit(pairs ...string) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		text := smallPlan
		for i := 0; i < len(pairs); i += 2 {
			if !strings.Contains(text, pairs[i]) {
				t.Fatalf("the plan does not hold %q", pairs[i])
			}
			text = strings.Replace(text, pairs[i], pairs[i+1], 1)
		}
		write(t, folder, "plan.yaml", text)
	}
}

// file puts a file in the place of a sound one.
func file(name, text string) func(*testing.T, string) {
	return func(t *testing.T, folder string) { write(t, folder, name, text) }
}

// profile puts a profile in the place of the sound one.
func profile(text string) func(*testing.T, string) { return file("profile.csv", text) }

// ground puts another raster in the place of the sound one.
func ground(spoil func(*raster.GeoTIFF)) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		r := flatGround()
		spoil(&r)
		if err := raster.WriteGeoTIFF(filepath.Join(folder, "ground.tif"), r); err != nil {
			t.Fatal(err)
		}
	}
}

// flatGround is the raster of the small plan.
func flatGround() raster.GeoTIFF {
	grid := terrain.NewGrid(200, 200)
	for i := range grid.Cells {
		grid.Cells[i] = 100
	}
	return raster.GeoTIFF{Grid: grid, GeoTransform: [6]float64{9.9, 0.001, 0, 50.1, 0, -0.001}, EPSG: 4326, Type: raster.Float32, Unit: "m"}
}

const onPlan = "links FOLDER/plan.yaml -o FOLDER/out"

// mistakes are the ways in which a plan, a raster, a profile or a command line goes wrong.
var mistakes = slices.Concat(planMistakes, groundMistakes, lossMistakes, usageMistakes)

var planMistakes = []mistake{
	{"no such plan", nil, "links FOLDER/none.yaml -o FOLDER/out", exitOther, "none.yaml: no such file"},
	{"a folder for a plan", nil, "links FOLDER/ -o FOLDER/out", exitOther, "is a directory"},
	{"an empty plan", file("plan.yaml", ""), onPlan, exitUsage, "plan.yaml:1:1: is empty"},
	{"a raster for a plan", nil, "links FOLDER/ground.tif -o FOLDER/out", exitUsage, "is not UTF-8 text"},
	{"a plan of 10 MB", file("plan.yaml", smallPlan+"# "+strings.Repeat("x", 10<<20)), onPlan, exitUsage, "larger than a plan may be, 1 MiB"},
	{"a long list of one mistake", file("plan.yaml", smallPlan+strings.Repeat("a: 1\n", 10_000)), onPlan, exitUsage, "more"},
	{"a YAML bomb", file("plan.yaml", bomb()), onPlan, exitUsage, "plans do not use anchors, aliases"},
	{"an alias to itself", edit("radios: {r:", "radios: &x {q: *x, r:"), onPlan, exitUsage, "plans do not use anchors, aliases"},
	{"deep nesting", file("plan.yaml", "format: "+strings.Repeat("[", 1<<12)), onPlan, exitUsage, "nested deeper than"},
	{"no unit", edit(`"151.5 MHz"`, `151.5`), onPlan, exitUsage, "3:27: channels.c.frequency: 151.5 is a bare number and lacks its unit"},
	{"a wrong unit", edit(`"15 m"`, `"15 MHz"`), onPlan, exitUsage, `the unit "MHz" does not fit here`},
	{"no height", edit(`"15 m"`, `"0 m"`), onPlan, exitUsage, `"0 m" is not a length above zero`},
	{"an absurd height", edit(`"15 m"`, `"15 km"`), onPlan, exitUsage, "15000 m is out of range"},
	{"a height that is no number", edit(`"15 m"`, `"NaN m"`), onPlan, exitUsage, `"NaN m"`},
	{"a height beyond all numbers", edit(`"15 m"`, `"1e999 m"`), onPlan, exitUsage, "1e999 m"},
	{"too low a frequency", edit(`"151.5 MHz"`, `"29.9 MHz"`), onPlan, exitUsage, "29.9 MHz is out of range\n    hint: it lies from 30 MHz to 6 GHz"},
	{"too high a frequency", edit(`"151.5 MHz"`, `"6.1 GHz"`), onPlan, exitUsage, "6100 MHz is out of range"},
	{"two sites at one place", edit(`"49.98 N, 10.01 E"`, `"50.02 N, 10.00 E"`), onPlan, exitUsage, `8:15: sites[1].at: "B" stands where "A" stands`},
	{"a site 20 cm from another", edit(`"49.98 N, 10.01 E"`, `"50.020002 N, 10.00 E"`), onPlan, exitUsage, `"B" stands where "A" stands`},
	{"a site outside the ground", edit(`"49.98 N, 10.01 E"`, `"49.98 N, 11.01 E"`), onPlan, exitUsage, `8:15: sites[1].at: "B": the elevation rasters do not reach: no height at 49.98000 N, 11.01000 E`},
	{"a site nowhere", edit(`"49.98 N, 10.01 E"`, `"95 N, 10 E"`), onPlan, exitUsage, "sites[1].at: "},
	{"an unknown grid", edit(`"49.98 N, 10.01 E"`, `{epsg: 99999, easting: 1, northing: 2}`), onPlan, exitUsage, "99999 is out of range"},
	{"easting and northing off the grid", edit(`"49.98 N, 10.01 E"`, `{epsg: 32632, easting: 1000000000000, northing: 1000000000000}`), onPlan, exitUsage, "sites[1].at: "},
	{"no such antenna", edit(`use: a, above_ground: "15 m"`, `use: b, above_ground: "15 m"`), onPlan, exitUsage, `there is no antenna "b"`},
	{"no such site", edit("to: B", "to: D"), onPlan, exitUsage, `links[0].to: there is no site "D"`},
	{"no fade stated", edit(`, fade: "10 dB"`, ""), onPlan, exitUsage, "links[0].fade: is missing"},
	{"no pattern file", edit(`{kind: omni, gain: "2 dBi"`, `{kind: table, pattern: none.csv`, `"15 m"`, `"15 m", facing: toward B`, `"16 m"`, `"16 m", facing: toward A`, `"17 m"`, `"17 m", facing: toward A`), onPlan, exitUsage, "antennas.a: open none.csv: no such file"},
	{"air that thickens upwards", edit("format: 1", "format: 1\nair: {delta_n: -20}"), onPlan, exitUsage, "2:16: air.delta_n: -20 is out of range"},
	{"a check of a bad plan", edit("format: 1", "format: 7"), "plan check FOLDER/plan.yaml", exitUsage, "7 is out of range"},
}

// bomb is YAML that would unfold to a billion entries.
func bomb() string {
	text := "a0: &a0 [x, x, x, x, x, x, x, x, x, x]\n"
	for i := 1; i < 9; i++ {
		text += fmt.Sprintf("a%[1]d: &a%[1]d [*a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d, *a%[2]d]\n", i, i-1)
	}
	return text + smallPlan
}

// groundMistakes are those that GDAL and PROJ meet.
var groundMistakes = []mistake{
	{"no such raster", remove("ground.tif"), onPlan, exitUsage, "elevation raster ground.tif: file does not exist"},
	{"an empty raster", file("ground.tif", ""), onPlan, exitUsage, "GDAL cannot read it as a raster"},
	{"a text for a raster", file("ground.tif", "d_km,h_m\n"), onPlan, exitUsage, "GDAL cannot read it as a raster"},
	{"a raster cut off in its head", truncate(100), onPlan, exitUsage, "elevation raster ground.tif: "},
	{"a raster cut off in its cells", truncate(100_000), onPlan, exitUsage, "reading the cells from column"},
	{"a raster with its bytes turned", flip(8, 400), onPlan, exitUsage, "elevation raster ground.tif: "},
	{"a raster of another kind of place", ground(func(r *raster.GeoTIFF) { r.GeoTransform = [6]float64{569000, 30, 0, 5540000, 0, -30} }), onPlan, exitUsage, "the geotransform and the system do not belong together"},
	{"the wrong zone of a grid", ground(func(r *raster.GeoTIFF) { r.EPSG, r.GeoTransform = 32633, [6]float64{565000, 70, 0, 5547000, 0, -70} }), onPlan, exitUsage, "the elevation rasters do not reach"},
	{"no CRS", inWorldFile, onPlan, exitUsage, "it names no coordinate reference system: assign one"},
	{"no place at all", plainPicture, onPlan, exitUsage, "geotransform"},
	{"cells that are no number", ground(func(r *raster.GeoTIFF) { spoilCells(r, math.NaN()) }), onPlan, exitUsage, "a void in the elevation rasters"},
	{"cells that are no height", ground(func(r *raster.GeoTIFF) { spoilCells(r, 99999) }), onPlan, exitUsage, "holds 99999 m at"},
	{"a class that the table lacks", withCover(`{1: {height: "0 m"}}`), onPlan, exitUsage, "is of class 100, which the table of classes lacks"},
	{"heights for land cover", edit("[ground.tif]}}", `[ground.tif]}, cover: {raster: ground.tif, classes: {1: {height: "0 m"}}}}`), onPlan, exitUsage, "land-cover classes are whole numbers"},
	{"no cover raster", edit("[ground.tif]}}", `[ground.tif]}, cover: {raster: none.tif, classes: {1: {height: "0 m"}}}}`), onPlan, exitUsage, "cover raster none.tif: file does not exist"},
	{"a section outside the ground", edit(`"49.98 N, 9.99 E"`, `"49.98 N, 8.99 E"`), "section FOLDER/plan.yaml --link A..C -o FOLDER/out", exitOther, "the elevation rasters do not reach"},
	{"terrain of nothing", nil, "terrain FOLDER/none.tif -o FOLDER/out", exitOther, "raster none.tif: file does not exist"},
	{"terrain of a text", nil, "terrain FOLDER/plan.yaml -o FOLDER/out", exitOther, "GDAL cannot read it as a raster"},
	{"terrain of a broken raster", truncate(100_000), "terrain FOLDER/ground.tif -o FOLDER/out", exitOther, "reading the cells from column"},
}

// withCover adds land cover, all of class 100, and a table of classes.
func withCover(classes string) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		r := flatGround()
		r.Type, r.Unit = raster.Uint8, ""
		if err := raster.WriteGeoTIFF(filepath.Join(folder, "cover.tif"), r); err != nil {
			t.Fatal(err)
		}
		edit("[ground.tif]}}", "[ground.tif]}, cover: {raster: cover.tif, classes: "+classes+"}}")(t, folder)
	}
}

func remove(name string) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		if err := os.Remove(filepath.Join(folder, name)); err != nil {
			t.Fatal(err)
		}
	}
}

// spoilCells puts a value into a band of cells across the paths from A.
func spoilCells(r *raster.GeoTIFF, value float64) {
	for i := 95 * r.Grid.Cols; i < 105*r.Grid.Cols; i++ {
		r.Grid.Cells[i] = float32(value)
	}
	if math.IsNaN(value) {
		void := math.NaN()
		r.NoData = &void
	}
}

func truncate(bytes int64) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		if err := os.Truncate(filepath.Join(folder, "ground.tif"), bytes); err != nil {
			t.Fatal(err)
		}
	}
}

// flip turns bits of a part of the raster.
func flip(from, to int) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		path := filepath.Join(folder, "ground.tif")
		data, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		for i := from; i < to; i++ {
			data[i] ^= 0xa5
		}
		write(t, folder, "ground.tif", string(data))
	}
}

// plainPicture writes a grey picture (PGM) in the raster's place: cells, but no place on Earth.
func plainPicture(t *testing.T, folder string) {
	write(t, folder, "ground.tif", "P5 4 4 255\n0123456789abcdef")
}

// inWorldFile writes the same picture with its corners in a world file, which names no system.
func inWorldFile(t *testing.T, folder string) {
	plainPicture(t, folder)
	write(t, folder, "ground.tfw", "0.05\n0\n0\n-0.05\n9.925\n50.075\n")
	write(t, folder, "ground.wld", "0.05\n0\n0\n-0.05\n9.925\n50.075\n")
}

const onProfile = `loss FOLDER/profile.csv -o FOLDER/out --frequency 151.5_MHz `

var lossMistakes = []mistake{
	{"no such profile", nil, "loss FOLDER/none.csv --frequency 151.5_MHz", exitOther, "none.csv: no such file"},
	{"no frequency", nil, "loss FOLDER/profile.csv", exitUsage, "loss needs --frequency"},
	{"a frequency without unit", nil, "loss FOLDER/profile.csv --frequency 151.5", exitUsage, "lacks its unit"},
	{"a frequency out of range", nil, "loss FOLDER/profile.csv -o FOLDER/out --frequency 10_GHz", exitUsage, "must lie between 30 and 6000 MHz"},
	{"an unknown method", nil, onProfile + "--method p9999", exitUsage, `"p9999"`},
	{"an antenna under ground", nil, onProfile + "--tx-height=-3_m", exitUsage, "-3 m"},
	{"refractivity that is no number", nil, onProfile + "--delta-n NaN", exitUsage, "delta N is NaN"},
	{"refractivity that rises", nil, onProfile + "--delta-n=-20", exitUsage, "delta N is -20"},
	{"a slanted polarization", nil, onProfile + "--polarization sideways", exitUsage, "sideways"},
	{"an empty profile", profile(""), onProfile, exitOther, "profile.csv"},
	{"a profile of one point", profile("d_km,h_m\n0,100\n"), onProfile, exitOther, "2 are needed"},
	{"a profile without heights", profile("d_km\n0\n1\n"), onProfile, exitOther, "h_m"},
	{"a profile that is no number", profile("d_km,h_m\n0,100\n1,NaN\n2,100\n"), onProfile, exitOther, "profile.csv:3"},
	{"a profile with decimal commas", profile("d_km,h_m\n0,100\n0,5,100\n"), onProfile, exitOther, "profile.csv:3"},
	{"a profile that turns back", profile("d_km,h_m\n0,100\n2,100\n1,100\n"), onProfile, exitOther, "profile.csv:4"},
	{"a profile that starts elsewhere", profile("d_km,h_m\n5,100\n6,100\n"), onProfile, exitOther, "profile.csv:2"},
	{"an unknown zone", profile("d_km,h_m,zone\n0,100,4\n1,100,2\n"), onProfile, exitOther, "profile.csv:3"},
	{"a raster for a profile", nil, "loss FOLDER/ground.tif --frequency 151.5_MHz", exitOther, "ground.tif"},
}

var usageMistakes = []mistake{
	{"an unknown command", nil, "link FOLDER/plan.yaml", exitUsage, `fellreach has no command "link"`},
	{"an unknown command of plan", nil, "plan chek FOLDER/plan.yaml", exitUsage, `fellreach plan has no command "chek"`},
	{"plan alone", nil, "plan", exitUsage, "plan needs new, check or schema"},
	{"an unknown flag", nil, "links FOLDER/plan.yaml --fromat json", exitUsage, "unknown flag: --fromat"},
	{"an unknown letter", nil, "links FOLDER/plan.yaml -x", exitUsage, "unknown shorthand flag"},
	{"a flag without its value", nil, "links FOLDER/plan.yaml --format", exitUsage, "flag needs an argument: --format"},
	{"an unknown format", nil, "links FOLDER/plan.yaml --format xml", exitUsage, `--format "xml" is not one of table, json, csv, geojson`},
	{"a format of another command", nil, "links FOLDER/plan.yaml --format svg", exitUsage, `--format "svg" is not one of`},
	{"an unknown format of terrain", nil, "terrain FOLDER/ground.tif --format csv", exitUsage, `"csv" is not one of table, json`},
	{"an unknown format of loss", nil, "loss FOLDER/profile.csv --frequency 151.5_MHz --format csv", exitUsage, `"csv" is not one of table, json`},
	{"lines of JSON", nil, "links FOLDER/plan.yaml --lines --format json", exitUsage, "--lines goes with --format table"},
	{"no plan", nil, "links", exitUsage, "links takes one plan file\n"},
	{"two plans", nil, "links FOLDER/plan.yaml FOLDER/plan.yaml", exitUsage, "links takes one plan file, not 2: "},
	{"no raster", nil, "terrain", exitUsage, "terrain takes at least one raster\n"},
	{"no profile", nil, "loss --frequency 151.5_MHz", exitUsage, "loss takes one profile\n"},
	{"no plan to check", nil, "plan check", exitUsage, "plan check takes one plan file\n"},
	{"arguments of version", nil, "version 2", exitUsage, "version takes no arguments"},
	{"arguments of schema", nil, "plan schema FOLDER/plan.yaml", exitUsage, "plan schema takes no arguments"},
	{"no link of a section", nil, "section FOLDER/plan.yaml", exitUsage, "section needs --link"},
	{"an unknown link", nil, "section FOLDER/plan.yaml --link spur -o FOLDER/out", exitUsage, `there is no link "spur"`},
	{"unknown ends", nil, "section FOLDER/plan.yaml --link A..D -o FOLDER/out", exitUsage, `"A..D" does not name two stations`},
	{"one end twice", nil, "section FOLDER/plan.yaml --link A..A -o FOLDER/out", exitUsage, "both ends stand at one site"},
	{"one of two links", edit("links: [", `links: [{from: B, to: A, fade: "1 dB"}, `), "section FOLDER/plan.yaml --link A..B -o FOLDER/out", exitUsage, "2 links run between A and B"},
	{"a demo into a folder", nil, "demo FOLDER/", exitUsage, "exists already"},
	{"a demo onto a file", nil, "demo FOLDER/plan.yaml", exitUsage, "exists already"},
	{"a demo below a file", nil, "demo --quiet FOLDER/plan.yaml/demo", exitOther, "not a directory"},
	{"two demos", nil, "demo FOLDER/a FOLDER/b", exitUsage, "demo takes at most one folder"},
	{"a new plan onto a plan", nil, "plan new FOLDER/plan.yaml", exitUsage, "exists already"},
	{"a new plan in no folder", nil, "plan new FOLDER/none/plan.yaml", exitOther, "error: none/plan.yaml cannot be written: no such file or directory"},
	{"output into no folder", nil, "links FOLDER/plan.yaml -o FOLDER/none/out", exitOther, "error: none/out cannot be written: no such file or directory"},
	{"output below a file", nil, "links FOLDER/plan.yaml -o FOLDER/plan.yaml/out", exitOther, "error: plan.yaml/out cannot be written: not a directory"},
	{"output onto a folder", makeFolder("taken"), "links FOLDER/plan.yaml -o FOLDER/taken", exitOther, "error: taken cannot be written: is a directory"},
	{"output onto the plan", nil, "links FOLDER/plan.yaml -o FOLDER/plan.yaml", exitUsage, "plan.yaml is what the command reads"},
	{"output onto the profile", nil, "loss FOLDER/profile.csv --frequency 151.5_MHz -o FOLDER/profile.csv", exitUsage, "profile.csv is what the command reads"},
}

func makeFolder(name string) func(*testing.T, string) {
	return func(t *testing.T, folder string) {
		if err := os.Mkdir(filepath.Join(folder, name), 0o755); err != nil {
			t.Fatal(err)
		}
	}
}

// spoiled makes the folder of a mistake and its command line.
func (m mistake) spoiled(t *testing.T) (folder string, args []string) {
	t.Helper()
	folder = t.TempDir()
	write(t, folder, "plan.yaml", smallPlan)
	write(t, folder, "profile.csv", smallProfile)
	ground(noChange)(t, folder)
	if m.prepare != nil {
		m.prepare(t, folder)
	}
	for _, arg := range strings.Fields(m.args) {
		arg = strings.ReplaceAll(arg, "_", " ")
		args = append(args, strings.ReplaceAll(arg, "FOLDER", folder))
	}
	return folder, args
}

// Every mistake gives one clear error on standard error and nothing else anywhere.
func TestMistakes(t *testing.T) {
	for _, m := range mistakes {
		t.Run(m.name, func(t *testing.T) {
			folder, args := m.spoiled(t)
			before := contents(t, folder)
			a := fellreach(args...)
			m.check(t, folder, a)
			if after := contents(t, folder); after != before {
				t.Errorf("files before:\n%s\nafter:\n%s", before, after)
			}
		})
	}
}

func (m mistake) check(t *testing.T, folder string, a answer) {
	t.Helper()
	if a.status != m.status {
		t.Errorf("status %d, want %d", a.status, m.status)
	}
	if a.out != "" {
		t.Errorf("standard output: %.200s", a.out)
	}
	text := strings.ReplaceAll(a.err, folder+"/", "")
	if !strings.HasPrefix(text, "fellreach: error: ") || strings.Count(text, "fellreach: error:") != 1 || !strings.HasSuffix(text, "\n") {
		t.Errorf("not one error: %s", text)
	}
	if !strings.Contains(text, m.want) {
		t.Errorf("got: %s\nwant in it: %s", text, m.want)
	}
	if strings.Contains(text, "goroutine ") || strings.Contains(text, "panic") || strings.Contains(text, "%!") || len(text) > 12_000 {
		t.Errorf("not a message for people: %.1000s", text)
	}
}

// contents lists what a folder holds, with sizes and times.
func contents(t *testing.T, folder string) string {
	t.Helper()
	entries, err := os.ReadDir(folder)
	if err != nil {
		t.Fatal(err)
	}
	var list strings.Builder
	for _, e := range entries {
		info, err := e.Info()
		if err != nil {
			t.Fatal(err)
		}
		fmt.Fprintln(&list, e.Name(), info.Size(), info.ModTime().UnixNano())
	}
	return list.String()
}

// GDAL and PROJ write to the process's own standard error when they are let: in a process of its
// own the program says what it says here, not a word more.
func TestNothingFromCLibraries(t *testing.T) {
	for _, m := range groundMistakes {
		t.Run(m.name, func(t *testing.T) {
			folder, args := m.spoiled(t)
			got, want := program(t, args...), fellreach(args...)
			m.check(t, folder, got)
			if got != want {
				t.Errorf("as a program:\n%+v\nin process:\n%+v", got, want)
			}
		})
	}
}
