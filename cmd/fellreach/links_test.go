package main

import (
	"context"
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// The JSON of `links --format json`, by the keys that are promised.
type linksAnswer struct {
	Title string
	Links []linkAnswer
}

type linkAnswer struct {
	Name, From, To, Channel string
	DistanceKm              float64 `json:"distance_km"`
	AzimuthDeg              float64 `json:"azimuth_deg"`
	BackAzimuthDeg          float64 `json:"back_azimuth_deg"`
	Verdict                 string
	MarginDB                float64 `json:"margin_db"`
	Chance                  float64
	Warnings                []string
	Directions              []directionAnswer
}

type directionAnswer struct {
	From, To           string
	FrequencyHz        float64 `json:"frequency_hz"`
	MarginDB           float64 `json:"margin_db"`
	ReceivedDBm        float64 `json:"received_dbm"`
	RequiredDBm        float64 `json:"required_dbm"`
	TransmissionLossDB float64 `json:"transmission_loss_db"`
	FadeDB             float64 `json:"fade_db"`
	Lines              []lineAnswer
}

type lineAnswer struct {
	Name    string
	ValueDB float64 `json:"value_db"`
	Kind    string
	Source  string
}

// The keys of the JSON, all promised to its readers.
var (
	linkKeys      = []string{"from", "to", "channel", "distance_km", "azimuth_deg", "back_azimuth_deg", "verdict", "margin_db", "chance", "warnings", "directions"}
	directionKeys = []string{"from", "to", "frequency_hz", "margin_db", "received_dbm", "required_dbm", "transmission_loss_db", "fade_db", "departure_deg", "arrival_deg", "lines"}
	lineKeys      = []string{"name", "value_db", "kind", "source"}
)

var jacksboro = testdata("plans", "jacksboro.yaml")

// plans are the plans that the tests of links run on, each with some link that does not close.
var plans = map[string]func(*testing.T) string{
	"demo":      demo,
	"jacksboro": func(*testing.T) string { return jacksboro },
}

// eachLink runs a test on every link of the plans.
func eachLink(t *testing.T, test func(t *testing.T, l linkAnswer)) {
	for name, path := range plans {
		for _, l := range linksOf(t, path(t)) {
			t.Run(name+"/"+l.From+".."+l.To, func(t *testing.T) { test(t, l) })
		}
	}
}

func linksOf(t *testing.T, path string) []linkAnswer {
	t.Helper()
	return decoded[linksAnswer](t, succeeds(t, exitLinks, "links", path, "--format", "json")).Links
}

func TestLinksJSONKeys(t *testing.T) {
	type object = map[string]any
	all := decoded[object](t, succeeds(t, exitLinks, "links", demo(t), "--format", "json"))
	haveKeys(t, all, "title", "links")
	for _, l := range all["links"].([]any) {
		haveKeys(t, l.(object), linkKeys...)
		for _, d := range l.(object)["directions"].([]any) {
			haveKeys(t, d.(object), directionKeys...)
			for _, line := range d.(object)["lines"].([]any) {
				haveKeys(t, line.(object), lineKeys...)
			}
		}
	}
}

func haveKeys(t *testing.T, object map[string]any, keys ...string) {
	t.Helper()
	for _, key := range keys {
		if value, ok := object[key]; !ok || value == nil {
			t.Errorf("no %s in %.300v", key, object)
		}
	}
}

// The lines add up, as a reader with a pencil would add them.
func TestLinesAddUpToMargin(t *testing.T) {
	eachLink(t, func(t *testing.T, l linkAnswer) {
		for _, d := range l.Directions {
			by := map[string]float64{}
			needs, sum := 0, 0.0
			for _, line := range d.Lines {
				by[line.Kind] += line.ValueDB
				sum += line.ValueDB
				if line.Kind == "need" {
					needs++
				}
				if line.Name == "" || line.Source == "" {
					t.Errorf("%+v lacks its name or its source", line)
				}
				if !slices.Contains([]string{"power", "gain", "loss", "noise", "need", "allowance"}, line.Kind) {
					t.Errorf("%q is of an unknown kind %q", line.Name, line.Kind)
				}
			}
			near(t, "sum of the lines", sum, d.MarginDB, 1e-9)
			near(t, "need", by["need"], -d.RequiredDBm, 1e-9)
			near(t, "received level", by["power"]+by["gain"]+by["loss"], d.ReceivedDBm, 1e-9)
			near(t, "margin", d.ReceivedDBm+by["noise"]+by["need"]+by["allowance"], d.MarginDB, 1e-9)
			if needs != 1 {
				t.Errorf("%d lines of need", needs)
			}
		}
	})
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s is %.12g, want %.12g within %g", what, got, want, tolerance)
	}
}

func TestDirectionsOfLinks(t *testing.T) {
	eachLink(t, func(t *testing.T, l linkAnswer) {
		out, back := l.Directions[0], l.Directions[len(l.Directions)-1]
		if out.From != l.From || out.To != l.To {
			t.Errorf("the first direction runs %s to %s", out.From, out.To)
		}
		if l.MarginDB != min(out.MarginDB, back.MarginDB) {
			t.Errorf("margin %g, of the directions %g and %g", l.MarginDB, out.MarginDB, back.MarginDB)
		}
		if len(l.Directions) == 1 {
			return
		}
		if len(l.Directions) != 2 || back.From != l.To || back.To != l.From {
			t.Errorf("%d directions, the last %s to %s", len(l.Directions), back.From, back.To)
		}
		if out.FrequencyHz == back.FrequencyHz && out.TransmissionLossDB != back.TransmissionLossDB {
			t.Errorf("one frequency, losses of %.12g and %.12g dB", out.TransmissionLossDB, back.TransmissionLossDB)
		}
	})
}

// The verdict follows from the margin; both plans aim at 6 dB.
func TestVerdicts(t *testing.T) {
	eachLink(t, func(t *testing.T, l linkAnswer) {
		want := "thin"
		if l.MarginDB < 0 {
			want = "fails"
		} else if l.MarginDB >= 6 {
			want = "closes"
		}
		if l.Verdict != want || l.Chance < 0 || l.Chance > 1 {
			t.Errorf("margin %g dB: %s with a chance of %g, want %s", l.MarginDB, l.Verdict, l.Chance, want)
		}
	})
}

// Links come in the order of the plan; a one-way link has one direction.
func TestLinksInPlanOrder(t *testing.T) {
	var got []string
	for _, l := range linksOf(t, jacksboro) {
		got = append(got, l.From+" to "+l.To+", "+strconv.Itoa(len(l.Directions)))
	}
	want := []string{"Cairn to Larch top, 2", "Kestrel rock to Bracken, 2", "Larch top to Ferry gauge, 2", "Ferry gauge to Cairn, 2", "Mill weir to Ford gauge, 1"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q, want %q", got, want)
	}
}

// Status 3 tells that some link is thin or fails, 0 that all close.
func TestLinksStatus(t *testing.T) {
	folder := t.TempDir()
	ground(noChange)(t, folder)
	closing := write(t, folder, "closing.yaml", smallPlan)
	thin := write(t, folder, "thin.yaml", strings.Replace(smallPlan, "links:", "aim: {margin: \"100 dB\"}\nlinks:", 1))
	failing := write(t, folder, "failing.yaml", strings.Replace(smallPlan, `"10 dB"`, `"300 dB"`, 1))
	for path, want := range map[string]struct {
		status int
		words  string
	}{closing: {exitDone, "● closes"}, thin: {exitLinks, "◐ thin"}, failing: {exitLinks, "○ fails"}} {
		if out := succeeds(t, want.status, "links", path); !strings.Contains(out, want.words) {
			t.Errorf("%s: want %s in:\n%s", path, want.words, out)
		}
	}
}

// The same plan gives the same bytes, however the work is shared out.
func TestLinksRepeat(t *testing.T) {
	one := succeeds(t, exitLinks, "links", demo(t), "--format", "json") // in full precision
	if two := succeeds(t, exitLinks, "links", demo(t), "--format", "json"); one != two {
		t.Error("two runs differ")
	}
}

func TestLinksTableNamesEveryLink(t *testing.T) {
	table := succeeds(t, exitLinks, "links", demo(t))
	lines := succeeds(t, exitLinks, "links", demo(t), "--lines")
	if !strings.HasPrefix(lines, table) {
		t.Error("--lines does not begin with the table")
	}
	for _, l := range linksOf(t, demo(t)) {
		row := slices.ContainsFunc(strings.Split(table, "\n"), func(line string) bool {
			return strings.Contains(line, l.Verdict) && strings.Contains(line, l.From) && strings.Contains(line, l.To) && strings.Contains(line, l.Channel)
		})
		if !row {
			t.Errorf("no row for %s to %s", l.From, l.To)
		}
		for _, d := range l.Directions {
			for _, line := range d.Lines {
				if !strings.Contains(lines, line.Name) {
					t.Errorf("--lines lacks %q", line.Name)
				}
			}
		}
	}
}

func TestLinksCSV(t *testing.T) {
	rows, err := csv.NewReader(strings.NewReader(succeeds(t, exitLinks, "links", jacksboro, "--format", "csv"))).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	column := map[string]int{}
	for i, name := range rows[0] {
		column[name] = i
	}
	next := 1
	for _, l := range linksOf(t, jacksboro) {
		for _, d := range l.Directions {
			row := rows[next]
			next++
			if row[column["from"]] != d.From || row[column["to"]] != d.To || row[column["verdict"]] != l.Verdict {
				t.Errorf("%v is not the row of %s to %s", row, d.From, d.To)
			}
			for name, want := range map[string]float64{"margin_db": d.MarginDB, "received_dbm": d.ReceivedDBm, "transmission_loss_db": d.TransmissionLossDB, "link_margin_db": l.MarginDB} {
				got, err := strconv.ParseFloat(row[column[name]], 64)
				if err != nil {
					t.Error(err)
				}
				near(t, name, got, want, 0.005+1e-9) // two decimals
			}
		}
	}
	if next != len(rows) {
		t.Errorf("%d rows, want %d", len(rows), next)
	}
}

// Every decibel that the plan states names its line in the plan.
func TestSourcesNameLines(t *testing.T) {
	text, err := os.ReadFile(jacksboro)
	if err != nil {
		t.Fatal(err)
	}
	plan := strings.Split(string(text), "\n")
	for source, inLine := range map[string]string{
		"transmitter hill": "power: \"10 W\"", "sensitivity": "sensitivity: \"-117 dBm\"", "wet leaves": "wet leaves", "feeder half-inch, 15 m": "half-inch: {", "connectors, 4": "connectors:",
	} {
		found := false
		for _, l := range linksOf(t, jacksboro) {
			for _, d := range l.Directions {
				for _, line := range d.Lines {
					if !strings.Contains(line.Name, source) {
						continue
					}
					found = true
					_, after, _ := strings.Cut(line.Source, "jacksboro.yaml:")
					number, err := strconv.Atoi(strings.FieldsFunc(after+" ", func(r rune) bool { return r < '0' || r > '9' })[0])
					if err != nil || !strings.Contains(plan[number-1], inLine) {
						t.Errorf("%q says %q, which is: %s", line.Name, line.Source, plan[number-1])
					}
				}
			}
		}
		if !found {
			t.Errorf("no line of %q", source)
		}
	}
}

// A result goes into a file whole; a command that fails leaves the file as it was.
func TestOutputIntoFile(t *testing.T) {
	folder := t.TempDir()
	path := filepath.Join(folder, "links.json")
	if err := os.WriteFile(path, []byte("kept"), 0o600); err != nil {
		t.Fatal(err)
	}
	a := fellreach("links", write(t, folder, "plan.yaml", "format: 2"), "--format", "json", "-o", path)
	if text, _ := os.ReadFile(path); a.status != exitUsage || string(text) != "kept" {
		t.Errorf("status %d; the file holds %q", a.status, text)
	}
	if out := succeeds(t, exitLinks, "links", jacksboro, "--format", "json", "-o", path); out != "" {
		t.Errorf("standard output: %s", out)
	}
	text, err := os.ReadFile(path)
	if err != nil || string(text) != succeeds(t, exitLinks, "links", jacksboro, "--format", "json") {
		t.Errorf("the file does not hold what standard output shows: %v", err)
	}
	if info, err := os.Stat(path); err != nil || info.Mode().Perm() != 0o600 {
		t.Errorf("the file's permissions have changed: %v %v", info.Mode(), err)
	}
	if entries, _ := os.ReadDir(folder); len(entries) != 2 {
		t.Errorf("the folder holds %v", entries)
	}
}

// A pipe or a device is written into, not replaced.
func TestOutputIntoPipe(t *testing.T) {
	read, writeEnd, err := os.Pipe()
	if err != nil {
		t.Fatal(err)
	}
	defer read.Close()
	defer writeEnd.Close()
	succeeds(t, exitLinks, "links", jacksboro, "--format", "csv", "-o", "/dev/fd/"+strconv.Itoa(int(writeEnd.Fd())))
	start := make([]byte, 9)
	if _, err := read.Read(start); err != nil || string(start) != "link_from" {
		t.Errorf("the pipe holds %q, %v", start, err)
	}
}

// An interrupt ends a command with an error and without a result, and leaves no file.
func TestInterrupt(t *testing.T) {
	folder := t.TempDir()
	ctx, stop := context.WithCancel(context.Background())
	stop()
	for _, args := range [][]string{
		{"links", jacksboro, "-o", filepath.Join(folder, "out")},
		{"terrain", testdata("terrain", "jacksboro.tif"), "-o", filepath.Join(folder, "out")},
		{"demo", filepath.Join(folder, "demo"), "--quiet"},
	} {
		a := fellreachWithin(ctx, args...)
		if a.status != exitOther || a.out != "" || a.err != "fellreach: error: interrupted before there was a result\n" {
			t.Errorf("%s: %+v", args[0], a)
		}
	}
	if entries, _ := os.ReadDir(folder); len(entries) != 0 {
		t.Errorf("the interrupted commands left %v", entries)
	}
}
