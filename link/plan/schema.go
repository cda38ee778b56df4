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
