package plan

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
)

// An Error is one thing wrong with a plan.
type Error struct {
	File         string
	Line, Column int    // from 1
	Field        string // "channels.poll.frequency", "sites[2].mast"
	Problem      string // what is wrong, with the value
	Hint         string // what to do about it, may be empty
}

func (e *Error) Error() string {
	text := fmt.Sprintf("%s:%d:%d: ", e.File, e.Line, e.Column)
	if e.Field != "" {
		text += e.Field + ": "
	}
	text += e.Problem
	if e.Hint != "" {
		text += "\n    hint: " + e.Hint
	}
	return text
}

// Errors is everything wrong with a plan, in the order of the file, never empty.
type Errors []*Error

// mostShown bounds how many problems one message lists.
const mostShown = 50

func (e Errors) Error() string {
	var lines []string
	for i, one := range e {
		if i == mostShown {
			lines = append(lines, fmt.Sprintf("and %d more", len(e)-mostShown))
			break
		}
		lines = append(lines, one.Error())
	}
	return strings.Join(lines, "\n")
}

// Unwrap gives errors.As access to the single problems.
func (e Errors) Unwrap() []error {
	all := make([]error, len(e))
	for i := range e {
		all[i] = e[i]
	}
	return all
}

func (e Errors) sorted() Errors {
	slices.SortStableFunc(e, func(a, b *Error) int {
		return cmp.Or(cmp.Compare(a.Line, b.Line), cmp.Compare(a.Column, b.Column))
	})
	return e
}
