package plan

import "fellreach/link/propagation"

// methods are the path methods a plan can ask for; fades tells whether the method knows the
// fading that an availability above 50 % asks for.
var methods = map[string]struct {
	model propagation.Model
	fades bool
}{
	"free-space": {propagation.FreeSpace, false},
	"p526":       {propagation.P526, false},
	"p1812":      {propagation.P1812, true},
}
