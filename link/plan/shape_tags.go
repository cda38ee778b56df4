package plan

import (
	"fmt"
	"reflect"
	"strconv"
	"strings"
)

// A field is one key of a struct of the shape.
type field struct {
	key      string
	index    []int
	required bool
	rules    tagRules
}

// tagRules are the limits of a jsonschema tag that the decoder honours.
type tagRules struct {
	enum                              []string
	minimum, maximum                  *float64
	minItems, maxItems, minProperties int
}

// fieldsOf lists the keys of a struct, those of embedded structs among them.
func fieldsOf(t reflect.Type) []field {
	var list []field
	for _, f := range reflect.VisibleFields(t) {
		key, option, _ := strings.Cut(f.Tag.Get("json"), ",")
		if f.Anonymous || !f.IsExported() || key == "" {
			continue
		}
		list = append(list, field{key, f.Index, option != "omitempty", rulesOf(f.Tag.Get("jsonschema"))})
	}
	return list
}

func keysOf(fields []field) []string {
	keys := make([]string, len(fields))
	for i, f := range fields {
		keys[i] = f.key
	}
	return keys
}

func rulesOf(tag string) tagRules {
	var r tagRules
	for _, part := range strings.Split(tag, ",") {
		name, text, _ := strings.Cut(part, "=")
		number, _ := strconv.ParseFloat(text, 64)
		switch name {
		case "enum":
			r.enum = append(r.enum, text)
		case "minimum":
			r.minimum = &number
		case "maximum":
			r.maximum = &number
		case "minItems":
			r.minItems = int(number)
		case "maxItems":
			r.maxItems = int(number)
		case "minProperties":
			r.minProperties = int(number)
		}
	}
	return r
}

func (r tagRules) rangeHint() string {
	switch {
	case r.minimum != nil && r.maximum != nil && *r.minimum == *r.maximum:
		return fmt.Sprintf("write %g", *r.minimum)
	case r.minimum != nil && r.maximum != nil:
		return fmt.Sprintf("it lies from %g to %g", *r.minimum, *r.maximum)
	case r.minimum != nil:
		return fmt.Sprintf("it is %g or more", *r.minimum)
	}
	return ""
}

func (r tagRules) countHint() string {
	if r.minItems == r.maxItems {
		return fmt.Sprintf("it needs exactly %d", r.minItems)
	}
	return fmt.Sprintf("it needs at least %d", r.minItems)
}
