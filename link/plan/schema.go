package plan

import (
	"encoding/json"

	"github.com/invopop/jsonschema"
)

// Schema returns the JSON Schema (draft 2020-12) of a plan file, for editors and other programs.
// It holds the form of the file; references between its parts are checked by [Parse] alone.
func Schema() ([]byte, error) {
	s := reflected(&Plan{})
	s.Version = jsonschema.Version
	s.Title = "Fellreach plan, format 1"
	return json.MarshalIndent(s, "", "  ")
}

// reflected returns the schema of a struct of the shape, without references.
func reflected(shape any) *jsonschema.Schema {
	r := jsonschema.Reflector{DoNotReference: true, Anonymous: true, ExpandedStruct: true}
	s := r.Reflect(shape)
	s.Version = ""
	return s
}

// JSONSchemaExtend says that a channel has one frequency or two.
func (Channel) JSONSchemaExtend(s *jsonschema.Schema) {
	s.OneOf = []*jsonschema.Schema{
		{Required: []string{"frequency"}, Not: &jsonschema.Schema{AnyOf: requiring("out", "back")}},
		{Required: []string{"out", "back"}, Not: &jsonschema.Schema{AnyOf: requiring("frequency")}},
	}
}

// JSONSchemaExtend says that a receiver is given by its sensitivity or by its noise.
func (Radio) JSONSchemaExtend(s *jsonschema.Schema) {
	s.OneOf = []*jsonschema.Schema{
		{Required: []string{"sensitivity"}, Not: &jsonschema.Schema{AnyOf: requiring("required_snr")}},
		{Required: []string{"noise_figure", "noise_bandwidth", "required_snr"}, Not: &jsonschema.Schema{AnyOf: requiring("sensitivity")}},
	}
}

// JSONSchemaExtend says that an aim is a margin or a chance.
func (Aim) JSONSchemaExtend(s *jsonschema.Schema) {
	s.Not = &jsonschema.Schema{Required: []string{"margin", "chance"}}
}

// JSONSchemaExtend says that an insert loses or amplifies.
func (Insert) JSONSchemaExtend(s *jsonschema.Schema) {
	s.OneOf = []*jsonschema.Schema{
		{Required: []string{"loss"}, Not: &jsonschema.Schema{AnyOf: requiring("gain", "noise_figure")}},
		{Required: []string{"gain", "noise_figure", "receive_only"}, Not: &jsonschema.Schema{AnyOf: requiring("loss")}},
	}
}

// requiring returns one schema for each key that must be there.
func requiring(keys ...string) []*jsonschema.Schema {
	all := make([]*jsonschema.Schema, len(keys))
	for i, key := range keys {
		all[i] = &jsonschema.Schema{Required: []string{key}}
	}
	return all
}
