package main

import (
	"encoding/json"
	"os/exec"
	"slices"
	"strings"
	"testing"
)

// rooms lists what each package may import of the project: the one direction in which data flows.
var rooms = map[string][]string{
	"antenna":          {},
	"antenna/wire":     {"antenna"},
	"terrain":          {},
	"terrain/island":   {},
	"terrain/raster":   {"terrain"},
	"link/propagation": {"terrain"},
	"link/noise":       {},
	"link":             {"antenna", "terrain", "link/propagation", "link/noise"},
	"link/coverage":    {"antenna", "terrain", "terrain/raster", "link", "link/propagation", "link/noise"},
	"link/plan":        {"link/coverage", "antenna", "antenna/wire", "terrain", "terrain/raster", "link", "link/propagation", "link/noise"},
	"link/report":      {"link/coverage", "antenna", "antenna/wire", "terrain", "terrain/raster", "link", "link/propagation", "link/plan"},
	"web":              nil, // everything
	"cmd/fellreach":    nil, // everything
}

// pure packages have no C below them, so that they build with CGO_ENABLED=0. The Makefile tests
// them so.
var pure = []string{"antenna", "antenna/wire", "terrain", "terrain/island", "link", "link/propagation", "link/noise"}

type listed struct {
	ImportPath     string
	Imports        []string
	Deps, CgoFiles []string
}

func TestRooms(t *testing.T) {
	out, err := exec.Command("go", "list", "-json=ImportPath,Imports,Deps,CgoFiles", "fellreach/...").Output()
	if err != nil {
		t.Fatal(err)
	}
	for dec := json.NewDecoder(strings.NewReader(string(out))); dec.More(); {
		var p listed
		if err := dec.Decode(&p); err != nil {
			t.Fatal(err)
		}
		checkRoom(t, p)
	}
}

func checkRoom(t *testing.T, p listed) {
	name := strings.TrimPrefix(p.ImportPath, "fellreach/")
	allowed, known := rooms[name]
	if !known {
		t.Errorf("package %s is not in the list of rooms: say what it may import", name)
		return
	}
	for _, i := range p.Imports {
		ours, inside := strings.CutPrefix(i, "fellreach/")
		if inside && allowed != nil && !slices.Contains(allowed, ours) {
			t.Errorf("%s imports %s, against the direction of the data", name, ours)
		}
		if (i == "C" || strings.Contains(i, "lukeroth/gdal") || strings.Contains(i, "go-proj")) && name != "terrain/raster" {
			t.Errorf("%s imports %s: C stands in terrain/raster alone", name, i)
		}
		if i == "net/http" && name != "web" && name != "cmd/fellreach" {
			t.Errorf("%s knows HTTP", name)
		}
	}
	if slices.Contains(pure, name) && slices.Contains(p.Deps, "fellreach/terrain/raster") {
		t.Errorf("%s is to build without C and depends on terrain/raster", name)
	}
}
