package terrain

import (
	"errors"
	"math"
	"strings"
	"testing"

	"github.com/paulmach/orb"
)

func TestClasses(t *testing.T) {
	classes := Classes{1: {Zone: Sea}, 2: {}, 3: {HeightM: 12, Zone: Inland}}
	if err := classes.Check(); err != nil {
		t.Fatal(err)
	}
	for value, want := range map[int]Class{1: {0, Sea}, 2: {0, Inland}, 3: {12, Inland}} {
		if got, err := classes.At(value, orb.Point{}); got != want || err != nil {
			t.Errorf("class %d is %+v, %v, want %+v", value, got, err, want)
		}
	}
	_, err := classes.At(7, orb.Point{-20.118, 47.5231})
	var unknown *ClassError
	if !errors.As(err, &unknown) || unknown.Class != 7 || unknown.At != (orb.Point{-20.118, 47.5231}) {
		t.Fatalf("%v", err)
	}
	for _, want := range []string{"class 7", "47.52310 N, 20.11800 W", "1, 2, 3"} {
		if !strings.Contains(err.Error(), want) {
			t.Errorf("%q lacks %q", err, want)
		}
	}
	if _, err := Classes(nil).At(1, orb.Point{}); err == nil || !strings.Contains(err.Error(), "holds none") {
		t.Errorf("no table: %v", err)
	}
}

func TestClassesCheck(t *testing.T) {
	for _, tc := range []struct {
		class Class
		want  string
	}{
		{Class{HeightM: -1}, "height -1 m is outside 0 to 150 m"},
		{Class{HeightM: 151}, "height 151 m is outside 0 to 150 m"},
		{Class{HeightM: math.NaN()}, "NaN"},
		{Class{Zone: 2}, "zone 2 is none of 1 (sea), 3 (coastal land), 4 (inland)"},
	} {
		err := Classes{1: {}, 5: tc.class}.Check()
		if err == nil || !strings.Contains(err.Error(), "cover class 5: ") || !strings.Contains(err.Error(), tc.want) {
			t.Errorf("%+v: %v, want %q", tc.class, err, tc.want)
		}
	}
}
