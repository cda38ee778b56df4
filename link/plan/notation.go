package plan

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"

	"github.com/invopop/jsonschema"
)

// A notation is how a quantity is written: in one or more forms, each a number and its units.
// The parser and the published schema share its pattern.
type notation struct {
	what    string // "a frequency"
	example string
	forms   []form
	pattern *regexp.Regexp
}

type form struct {
	number string // pattern of the number before the unit
	units  []unit
}

// A unit turns the number before it into the canonical unit of its quantity.
type unit struct {
	name  string
	value func(number float64) float64
}

// Patterns of numbers. None takes an exponent: a plan is read by people.
const (
	anyNumber      = `[+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)`
	notNegative    = `\+?(?:[0-9]+\.?[0-9]*|\.[0-9]+)`
	positiveNumber = `\+?(?:0*[1-9][0-9]*\.?[0-9]*|0*\.[0-9]*[1-9][0-9]*)`
)

func newNotation(what, example string, forms ...form) *notation {
	var patterns []string
	for _, f := range forms {
		var names []string
		for _, u := range f.units {
			names = append(names, regexp.QuoteMeta(u.name))
		}
		patterns = append(patterns, "("+f.number+") *("+strings.Join(names, "|")+")")
	}
	return &notation{what, example, forms, regexp.MustCompile("^(?:" + strings.Join(patterns, "|") + ")$")}
}

// parse returns the value in the canonical unit and the unit it was written in.
func (n *notation) parse(text string) (float64, string, error) {
	groups := n.pattern.FindStringSubmatch(text)
	for i, f := range n.forms {
		if groups == nil || groups[2*i+2] == "" {
			continue
		}
		number, name := groups[2*i+1], groups[2*i+2]
		x, _ := strconv.ParseFloat(number, 64)
		for _, u := range f.units {
			if u.name != name {
				continue
			}
			if v := u.value(x); !math.IsInf(v, 0) && math.Abs(v) < 1e15 {
				return v, name, nil
			}
			return 0, "", &Refusal{fmt.Sprintf("%.40q is too large or too small a number", text), "write " + n.describe()}
		}
	}
	return 0, "", n.refuse(text)
}

var anyQuantity = regexp.MustCompile(`^([+-]?[0-9.,]+)\s*(\S*)$`)

// refuse says what is wrong with a text that the pattern does not match.
func (n *notation) refuse(text string) error {
	hint := "write " + n.describe()
	m := anyQuantity.FindStringSubmatch(strings.TrimSpace(text))
	switch {
	case m == nil:
		return &Refusal{fmt.Sprintf("%.40q is not a number with a unit", text), hint}
	case strings.Contains(m[1], ","):
		return &Refusal{fmt.Sprintf("%.40q is not a number with a unit", text), fmt.Sprintf("write decimals with a dot, %.40q", strings.Replace(text, ",", ".", 1))}
	case m[2] == "":
		return &Refusal{fmt.Sprintf("%.40q lacks its unit", text), hint}
	}
	for _, name := range n.unitNames() {
		if name == m[2] {
			return &Refusal{fmt.Sprintf("%.40q is not %s", text, strings.TrimSuffix(n.what, ",")), hint}
		}
		if strings.EqualFold(name, m[2]) {
			return &Refusal{fmt.Sprintf("%.40q: the unit is written %s", text, name), hint}
		}
	}
	return &Refusal{fmt.Sprintf("%.40q: the unit %.10q does not fit here", text, m[2]), hint}
}

func (n *notation) unitNames() []string {
	var names []string
	for _, f := range n.forms {
		for _, u := range f.units {
			names = append(names, u.name)
		}
	}
	return names
}

// describe says what the notation asks for.
func (n *notation) describe() string {
	return fmt.Sprintf("%s in %s, such as %q", n.what, orList(n.unitNames()), n.example)
}

func (n *notation) schema() *jsonschema.Schema {
	return &jsonschema.Schema{Type: "string", Pattern: n.pattern.String(), Description: n.describe()}
}

// A Refusal is a value or a question that cannot be taken, with advice: before its place in a plan
// is known, or where it was asked outside of one.
type Refusal struct{ Problem, Hint string }

func (r *Refusal) Error() string { return r.Problem + "\n    hint: " + r.Hint }

// orList joins names as a person would: "a, b or c".
func orList(names []string) string {
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	return strings.Join(names[:len(names)-1], ", ") + " or " + names[len(names)-1]
}
