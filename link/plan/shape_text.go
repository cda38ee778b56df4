package plan

import (
	"fmt"
	"regexp"
	"strings"

	"github.com/invopop/jsonschema"
)

// RodLength is a length in metres or wavelengths, or the length at which the rod resonates.
type RodLength struct {
	Span
	Resonant bool
}

// Set reads "0.982 m", "0.47 wl" or "resonant".
func (r *RodLength) Set(text string) error {
	if text == "resonant" {
		*r = RodLength{Resonant: true}
		return nil
	}
	*r = RodLength{}
	return r.Span.Set(text)
}

// JSONSchema gives the texts that Set accepts.
func (RodLength) JSONSchema() *jsonschema.Schema { return wordOr("resonant", spans) }

// Polarization is the slant of an antenna from upright, clockwise seen from behind it.
type Polarization struct{ SlantDeg float64 }

// Set reads "vertical", "horizontal" or an angle such as "45 deg".
func (p *Polarization) Set(text string) error {
	switch text {
	case "vertical":
		*p = Polarization{}
		return nil
	case "horizontal":
		*p = Polarization{SlantDeg: 90}
		return nil
	}
	var slant Angle
	if slant.Set(text) != nil {
		return &Refusal{fmt.Sprintf("%.40q is no polarization", text), `write vertical, horizontal, or a slant from upright such as "45 deg"`}
	}
	*p = Polarization{SlantDeg: float64(slant)}
	return nil
}

// JSONSchema gives the texts that Set accepts.
func (Polarization) JSONSchema() *jsonschema.Schema { return wordOr("vertical|horizontal", angles) }

// Facing is where an antenna points: a bearing from true north, or a site.
type Facing struct {
	BearingDeg float64
	Site       string // empty: the bearing counts
}

var towardSite = regexp.MustCompile(`^toward +(\S.*)$`)

// Set reads "123 deg" or "toward Gauge 3".
func (f *Facing) Set(text string) error {
	if m := towardSite.FindStringSubmatch(text); m != nil {
		*f = Facing{Site: strings.TrimSpace(m[1])}
		return nil
	}
	var bearing Angle
	if bearing.Set(text) != nil {
		return &Refusal{fmt.Sprintf("%.40q is no facing", text), `write a bearing from true north such as "123 deg", or "toward SITE"`}
	}
	*f = Facing{BearingDeg: float64(bearing)}
	return nil
}

// JSONSchema gives the texts that Set accepts.
func (Facing) JSONSchema() *jsonschema.Schema {
	return &jsonschema.Schema{AnyOf: []*jsonschema.Schema{angles.schema(), {Type: "string", Pattern: towardSite.String()}}}
}

func wordOr(words string, n *notation) *jsonschema.Schema {
	return &jsonschema.Schema{AnyOf: []*jsonschema.Schema{n.schema(), {Type: "string", Pattern: "^(?:" + words + ")$"}}}
}
