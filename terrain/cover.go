package terrain

import (
	"fmt"
	"maps"
	"slices"

	"github.com/paulmach/orb"
)

// A Class is what one value of a land-cover raster stands for.
type Class struct {
	HeightM float64 // of trees, roofs and the like above the ground, 0 to [MaxCoverM]
	Zone    Zone    // Sea or Inland; the zero value means Inland
}

// MaxCoverM is the greatest cover height that is taken for one: the tallest trees are about
// 115 m (from memory).
const MaxCoverM = 150

// Classes maps the values of a land-cover raster to what they stand for.
type Classes map[int]Class

// Check reports the first class, by number, whose height or zone is out of range.
func (c Classes) Check() error {
	for _, class := range slices.Sorted(maps.Keys(c)) {
		height, zone := c[class].HeightM, c[class].Zone
		if !(height >= 0 && height <= MaxCoverM) {
			return fmt.Errorf("cover class %d: height %g m is outside 0 to %d m", class, height, MaxCoverM)
		}
		if zone != 0 && zone != Sea && zone != Coastal && zone != Inland {
			return fmt.Errorf("cover class %d: zone %d is none of 1 (sea), 3 (coastal land), 4 (inland)", class, zone)
		}
	}
	return nil
}

// At returns the class of a raster's value; the place is for the error, a [*ClassError], alone.
func (c Classes) At(value int, place orb.Point) (Class, error) {
	class, known := c[value]
	if !known {
		return Class{}, &ClassError{Class: value, At: place, Known: slices.Sorted(maps.Keys(c))}
	}
	if class.Zone == 0 {
		class.Zone = Inland
	}
	return class, nil
}

// A ClassError is a value in a land-cover raster that the table of classes does not hold.
type ClassError struct {
	Class int
	At    orb.Point
	Known []int
}

func (e *ClassError) Error() string {
	return fmt.Sprintf("land cover at %s is of class %d, which the table of classes lacks (it holds %s): state a height and a zone for it",
		FormatDecimal(e.At), e.Class, listInts(e.Known))
}

// listInts writes numbers for a message: "1, 2, 3", "none".
func listInts(numbers []int) string {
	if len(numbers) == 0 {
		return "none"
	}
	text := ""
	for i, n := range numbers {
		if i > 0 {
			text += ", "
		}
		text += fmt.Sprint(n)
	}
	return text
}
