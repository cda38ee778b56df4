package plan

import (
	"bytes"
	"strings"
	"testing"

	"github.com/goccy/go-yaml"
	"github.com/santhosh-tekuri/jsonschema/v6"
)

// The published schema, in the hands of an independent validator, accepts and refuses the same
// files as the parser, as far as a schema can tell: it knows no references and no ranges of
// quantities.
func TestSchemaAgreesWithParser(t *testing.T) {
	schema := compiledSchema(t)
	good := map[string]string{"bare": bare, "every key": everyKey(t)}
	for name, text := range good {
		if err := schema.Validate(decoded(t, text)); err != nil {
			t.Errorf("%s: the parser accepts it, the schema does not: %v", name, err)
		}
	}
	for _, tc := range badPlans {
		if !tc.form {
			continue
		}
		if err := schema.Validate(decoded(t, tc.text(t))); err == nil {
			t.Errorf("%s: the parser refuses it, the schema does not", tc.name)
		}
	}
}

// Every key of the plan with every key can be dropped: parser and schema agree on which are
// needed.
func TestSchemaAgreesOnRequiredKeys(t *testing.T) {
	schema := compiledSchema(t)
	lines := strings.Split(everyKey(t), "\n")
	for i := range lines {
		if strings.HasPrefix(strings.TrimSpace(lines[i]), "-") {
			continue // a list entry's first line carries its dash
		}
		text := strings.Join(append(append([]string{}, lines[:i]...), lines[i+1:]...), "\n")
		var value any
		if yaml.Unmarshal([]byte(text), &value) != nil {
			continue
		}
		formErr := formProblems(text)
		schemaErr := schema.Validate(value)
		if (formErr == nil) != (schemaErr == nil) {
			t.Errorf("without line %d (%s): the parser says %v, the schema says %v", i+1, strings.TrimSpace(lines[i]), formErr, schemaErr)
		}
	}
}

// formProblems decodes a plan without the checks of references.
func formProblems(text string) error {
	_, err := Parse("x.yaml", []byte(text))
	if err == nil {
		return nil
	}
	for _, e := range err.(Errors) {
		if strings.Contains(e.Problem, "there is no ") || strings.Contains(e.Hint, "the plan names no") || strings.Contains(e.Problem, "lies below the mast") ||
			strings.Contains(e.Problem, "no mast to stand off") || strings.Contains(e.Problem, "does not compute the fading") || strings.Contains(e.Problem, "has no radio") || strings.Contains(e.Problem, "has no antenna") {
			continue
		}
		return e
	}
	return nil
}

func compiledSchema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	text, err := Schema()
	if err != nil {
		t.Fatal(err)
	}
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	c := jsonschema.NewCompiler()
	if err := c.AddResource("plan.json", doc); err != nil {
		t.Fatal(err)
	}
	schema, err := c.Compile("plan.json")
	if err != nil {
		t.Fatal(err)
	}
	return schema
}

// decoded reads YAML as a program that knows nothing of plans would.
func decoded(t *testing.T, text string) any {
	t.Helper()
	var value any
	if err := yaml.Unmarshal([]byte(text), &value); err != nil {
		t.Fatalf("%v in:\n%s", err, text)
	}
	return value
}
