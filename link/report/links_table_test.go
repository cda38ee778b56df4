package report

import (
	"bytes"
	"fmt"
	"strings"
	"testing"

	"fellreach/link"
	"fellreach/link/propagation"
)

func TestPathWords(t *testing.T) {
	for _, tc := range []struct {
		ratio float64
		want  string
	}{
		{1.2, "clear"},
		{1, "clear"},
		{0.75, "clear, 0.7 F1 at 4.2 km"},
		{0.6, "clear, 0.6 F1 at 4.2 km"},
		{0.59, "grazes at 4.2 km"},
		{0, "grazes at 4.2 km"},
		{-0.01, "blocked at 4.2 km"},
		{-8, "blocked at 4.2 km"},
	} {
		got := pathWords(&link.Result{Clearance: propagation.FresnelClearance{WorstRatio: tc.ratio, NeededRatio: 0.6, AtKm: 4.2}})
		if got != tc.want {
			t.Errorf("ratio %g: %q, want %q", tc.ratio, got, tc.want)
		}
	}
}

// A warning stands once, with the stations and links it holds for, however many links have it.
func TestWarningsOnce(t *testing.T) {
	var text bytes.Buffer
	if err := LinksTable(&text, madeResult()); err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{
		"warning: the path is made up\n         (crossing, Outer reef to Hill/uhf (voice <&>))\n",
		"warning: the mast is made up\n         (Harbour)\n",
	} {
		if strings.Count(text.String(), want) != 1 {
			t.Errorf("want once %q in:\n%s", want, &text)
		}
	}
}

// A table is for terminals and e-mails: no space at a line's end, no tab, no line of a break's own.
func TestTablesAreClean(t *testing.T) {
	for name, write := range reports {
		if !strings.HasSuffix(name, ".txt") {
			continue
		}
		var text bytes.Buffer
		if err := write(&text); err != nil {
			t.Fatal(err)
		}
		if !strings.HasSuffix(text.String(), "\n") || strings.Contains(text.String(), "\t") || strings.Contains(text.String(), " \n") || strings.Contains(text.String(), "\n\n\n") {
			t.Errorf("%s:\n%q", name, &text)
		}
	}
}

// A remark of very many places names some and counts the others; all are named where one more would
// do.
func TestManyPlaces(t *testing.T) {
	var places []string
	for i := range 40 {
		places = append(places, fmt.Sprintf("S%d", i))
	}
	for n, want := range map[int]string{1: "S0", 13: "S10, S11, S12", 14: "S10, S11 and 2 others", 40: "S10, S11 and 28 others"} {
		if got := placeWords(places[:n]); !strings.HasSuffix(got, want) || !strings.HasPrefix(got, "S0") {
			t.Errorf("%d places: %q, want it to end in %q", n, got, want)
		}
	}
}
