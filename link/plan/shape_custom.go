package plan

import (
	"fmt"
	"reflect"
	"slices"

	"github.com/goccy/go-yaml/ast"
	"github.com/invopop/jsonschema"
)

// OneOf is a group of keys whose `kind` says which others it may have.
type OneOf[K kindSet] struct {
	Kind string
	Spec any // a pointer to the struct of the kind
}

type kindSet interface{ kinds() []kind }

// A kind is one choice of a OneOf: its name and the shape of its keys. The one that is usual is
// meant where the plan writes no kind.
type kind struct {
	name  string
	spec  any
	usual bool
}

func (o *OneOf[K]) decode(d *decoder, n ast.Node, path string) {
	entries, ok := d.entries(n, path)
	if !ok {
		return
	}
	var k K
	kinds := k.kinds()
	names := make([]string, len(kinds))
	for i := range kinds {
		names[i] = kinds[i].name
	}
	j := slices.IndexFunc(kinds, func(k kind) bool { return k.usual })
	if i := slices.IndexFunc(entries, func(e entry) bool { return e.name == "kind" }); i >= 0 {
		name, ok := d.text(entries[i].node, path+".kind", nil)
		if !ok {
			return
		}
		if j = slices.Index(names, name); j < 0 {
			d.report(at(entries[i].node), path+".kind", fmt.Sprintf("%.40q is not a kind here", name), "write "+orList(names))
			return
		}
		entries = slices.Delete(entries, i, i+1)
	} else if j < 0 {
		d.report(at(n), path+".kind", "is missing", "write kind: "+orList(names))
		return
	}
	spec := reflect.New(reflect.TypeOf(kinds[j].spec).Elem())
	d.fields(entries, at(n), spec.Elem(), path)
	*o = OneOf[K]{kinds[j].name, spec.Interface()}
}

// JSONSchema lists the kinds with their keys.
func (OneOf[K]) JSONSchema() *jsonschema.Schema {
	var k K
	all := &jsonschema.Schema{}
	for _, kind := range k.kinds() {
		one := reflected(kind.spec)
		one.Properties.Set("kind", &jsonschema.Schema{Const: kind.name})
		if !kind.usual {
			one.Required = append([]string{"kind"}, one.Required...)
		}
		all.OneOf = append(all.OneOf, one)
	}
	return all
}

// At is a place as the plan writes it: a text of coordinates, or easting and northing of an
// EPSG coordinate system.
type At struct {
	Text string
	EPSG *EPSGPlace
}

// EPSGPlace is a place in a projected coordinate system, in its own units.
type EPSGPlace struct {
	EPSG     int     `json:"epsg" jsonschema:"minimum=1024,maximum=32767"`
	Easting  float64 `json:"easting"`
	Northing float64 `json:"northing"`
}

func (a *At) decode(d *decoder, n ast.Node, path string) {
	if _, group := n.(ast.MapNode); group {
		a.EPSG = &EPSGPlace{}
		d.structure(n, reflect.ValueOf(a.EPSG).Elem(), path)
		return
	}
	a.Text, _ = d.text(n, path, nil)
}

// JSONSchema gives the two ways to write a place.
func (At) JSONSchema() *jsonschema.Schema {
	return &jsonschema.Schema{OneOf: []*jsonschema.Schema{{Type: "string"}, reflected(&EPSGPlace{})}}
}

// Noise is an environment of Rec. ITU-R P.372, or a floor measured on site.
type Noise struct {
	Environment string
	Measured    *MeasuredNoise
}

// MeasuredNoise is a noise level in a bandwidth, at the receiver's port.
type MeasuredNoise struct {
	Measured  Level     `json:"measured"`
	Bandwidth Frequency `json:"bandwidth"`
}

var environments = []string{"city", "residential", "rural", "quiet rural"}

func (z *Noise) decode(d *decoder, n ast.Node, path string) {
	if _, group := n.(ast.MapNode); group {
		z.Measured = &MeasuredNoise{}
		d.structure(n, reflect.ValueOf(z.Measured).Elem(), path)
		return
	}
	d.scalar(n, reflect.ValueOf(&z.Environment).Elem(), tagRules{enum: environments}, path)
}

// JSONSchema gives the two ways to write noise.
func (Noise) JSONSchema() *jsonschema.Schema {
	return &jsonschema.Schema{OneOf: []*jsonschema.Schema{wordsSchema(environments), reflected(&MeasuredNoise{})}}
}

// Links is the list of links, or a word in its place: auto in the plan, all in weigh.
type Links struct {
	Auto bool
	List []Link
}

func (l *Links) decode(d *decoder, n ast.Node, path string) {
	if text, ok := n.(*ast.StringNode); ok && text.Value == "auto" {
		l.Auto = true
		return
	}
	d.list(n, reflect.ValueOf(&l.List).Elem(), tagRules{minItems: 1}, path)
}

// JSONSchema gives the word or the list.
func (Links) JSONSchema() *jsonschema.Schema {
	one := uint64(1)
	return &jsonschema.Schema{OneOf: []*jsonschema.Schema{
		wordsSchema([]string{"auto"}),
		{Type: "array", Items: reflected(&Link{}), MinItems: &one},
	}}
}

// LinkNames is all links of a site, or some by name.
type LinkNames struct {
	All   bool
	Names []string
}

func (l *LinkNames) decode(d *decoder, n ast.Node, path string) {
	if text, ok := n.(*ast.StringNode); ok && text.Value == "all" {
		l.All = true
		return
	}
	d.list(n, reflect.ValueOf(&l.Names).Elem(), tagRules{minItems: 1}, path)
}

// JSONSchema gives the word or the list.
func (LinkNames) JSONSchema() *jsonschema.Schema {
	one := uint64(1)
	return &jsonschema.Schema{OneOf: []*jsonschema.Schema{
		wordsSchema([]string{"all"}),
		{Type: "array", Items: &jsonschema.Schema{Type: "string"}, MinItems: &one},
	}}
}

// LossTable is the loss of a feeder by frequency, as its maker states it.
type LossTable []LossPoint

// LossPoint is one entry of a LossTable.
type LossPoint struct {
	FreqHz  float64
	DBPerM  float64
	written string
}

func (t *LossTable) decode(d *decoder, n ast.Node, path string) {
	entries, ok := d.entries(n, path)
	if ok && len(entries) == 0 {
		d.report(at(n), path, "is empty", `write at least one entry such as "100 MHz": "2.2 dB/100m"`)
	}
	for _, e := range entries {
		var f Frequency
		if err := f.Set(e.name); err != nil {
			d.reject(e.node, path, err)
			continue
		}
		var a Attenuation
		d.value(e.node, reflect.ValueOf(&a).Elem(), tagRules{}, join(path, e.name))
		*t = append(*t, LossPoint{float64(f), float64(a), e.name})
	}
}

// JSONSchema gives the keys and values of the table.
func (LossTable) JSONSchema() *jsonschema.Schema {
	one := uint64(1)
	return &jsonschema.Schema{Type: "object", MinProperties: &one, PropertyNames: frequencies.schema(), AdditionalProperties: attenuations.schema()}
}

func wordsSchema(words []string) *jsonschema.Schema {
	s := &jsonschema.Schema{Type: "string"}
	for _, w := range words {
		s.Enum = append(s.Enum, w)
	}
	return s
}
