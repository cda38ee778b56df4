package plan

import (
	"fmt"
	"math"
	"reflect"
	"slices"
	"strconv"
	"strings"

	"github.com/goccy/go-yaml/ast"
)

// A decoder walks the syntax tree of a plan into its shape, strictly, and collects every
// problem with its place instead of stopping at the first.
type decoder struct {
	file  string
	errs  Errors
	where map[string]position
	// optional are keys of the whole file that may be missing although its shape requires them.
	optional []string
}

// position is a place in the file, from 1.
type position struct{ line, column int }

// textual values read themselves from a string of the plan.
type textual interface{ Set(text string) error }

// custom values read themselves from any node.
type custom interface {
	decode(d *decoder, n ast.Node, path string)
}

func at(n ast.Node) position {
	if t := n.GetToken(); t != nil && t.Position != nil {
		return position{t.Position.Line, t.Position.Column}
	}
	return position{1, 1}
}

func (d *decoder) report(p position, path string, problem, hint string) {
	d.errs = append(d.errs, &Error{d.file, p.line, p.column, path, problem, hint})
}

func (d *decoder) reject(n ast.Node, path string, err error) {
	if h, ok := err.(*Refusal); ok {
		d.report(at(n), path, h.Problem, h.Hint)
		return
	}
	d.report(at(n), path, err.Error(), "")
}

// value decodes a node into v, a settable value of the shape.
func (d *decoder) value(n ast.Node, v reflect.Value, rules tagRules, path string) {
	if _, seen := d.where[path]; !seen {
		d.where[path] = at(n)
	}
	if v.Kind() == reflect.Pointer {
		v.Set(reflect.New(v.Type().Elem()))
		v = v.Elem()
	}
	switch target := v.Addr().Interface().(type) {
	case custom:
		target.decode(d, n, path)
		return
	case textual:
		if text, ok := d.text(n, path, target); ok {
			if err := target.Set(text); err != nil {
				d.reject(n, path, err)
			}
		}
		return
	}
	switch v.Kind() {
	case reflect.Struct:
		d.structure(n, v, path)
	case reflect.Map:
		d.table(n, v, rules, path)
	case reflect.Slice:
		d.list(n, v, rules, path)
	default:
		d.scalar(n, v, rules, path)
	}
}

// text returns the string of a node that must be one.
func (d *decoder) text(n ast.Node, path string, target any) (string, bool) {
	switch s := n.(type) {
	case *ast.StringNode:
		return s.Value, true
	case *ast.LiteralNode:
		return s.Value.Value, true
	}
	hint := ""
	if q, ok := target.(interface{ describe() string }); ok {
		hint = "write " + q.describe()
	}
	switch n.(type) {
	case *ast.IntegerNode, *ast.FloatNode:
		if hint != "" {
			d.report(at(n), path, n.GetToken().Value+" is a bare number and lacks its unit", hint)
		} else {
			d.report(at(n), path, n.GetToken().Value+" is a number where a text is due", fmt.Sprintf("write it in quotes, %q", n.GetToken().Value))
		}
	default:
		d.report(at(n), path, describe(n)+" where a text is due", hint)
	}
	return "", false
}

// scalar decodes text, numbers and truth values.
func (d *decoder) scalar(n ast.Node, v reflect.Value, rules tagRules, path string) {
	switch v.Kind() {
	case reflect.String:
		text, ok := d.text(n, path, nil)
		switch {
		case !ok:
		case text == "":
			d.report(at(n), path, "is empty", "")
		case len(rules.enum) > 0 && !slices.Contains(rules.enum, text):
			d.report(at(n), path, fmt.Sprintf("%.40q is not known here", text), "write "+orList(rules.enum))
		default:
			v.SetString(text)
		}
	case reflect.Bool:
		if b, ok := n.(*ast.BoolNode); ok {
			v.SetBool(b.Value)
		} else {
			d.report(at(n), path, describe(n)+" where true or false is due", "")
		}
	case reflect.Int:
		x, ok := number(n)
		if !ok || x != math.Trunc(x) || math.Abs(x) > 1e9 {
			d.report(at(n), path, describe(n)+" where a whole number is due", rules.rangeHint())
		} else if d.within(n, x, rules, path) {
			v.SetInt(int64(x))
		}
	case reflect.Float64:
		if x, ok := number(n); !ok {
			d.report(at(n), path, describe(n)+" where a plain number is due", rules.rangeHint())
		} else if d.within(n, x, rules, path) {
			v.SetFloat(x)
		}
	default:
		panic("plan: shape has a field of kind " + v.Kind().String())
	}
}

func (d *decoder) within(n ast.Node, x float64, rules tagRules, path string) bool {
	if (rules.minimum != nil && x < *rules.minimum) || (rules.maximum != nil && x > *rules.maximum) {
		d.report(at(n), path, fmt.Sprintf("%g is out of range", x), rules.rangeHint())
		return false
	}
	return true
}

func number(n ast.Node) (float64, bool) {
	switch x := n.(type) {
	case *ast.IntegerNode:
		v, err := strconv.ParseFloat(fmt.Sprint(x.Value), 64)
		return v, err == nil
	case *ast.FloatNode:
		return x.Value, !math.IsInf(x.Value, 0) && !math.IsNaN(x.Value)
	}
	return 0, false
}

func (d *decoder) list(n ast.Node, v reflect.Value, rules tagRules, path string) {
	seq, ok := n.(*ast.SequenceNode)
	if !ok {
		d.report(at(n), path, describe(n)+" where a list is due", "")
		return
	}
	if count := len(seq.Values); count < rules.minItems || (rules.maxItems > 0 && count > rules.maxItems) {
		d.report(at(n), path, fmt.Sprintf("has %d entries", count), rules.countHint())
	}
	v.Set(reflect.MakeSlice(v.Type(), len(seq.Values), len(seq.Values)))
	for i, item := range seq.Values {
		d.value(item, v.Index(i), tagRules{}, fmt.Sprintf("%s[%d]", path, i))
	}
}

// table decodes a mapping with keys of the planner's own.
func (d *decoder) table(n ast.Node, v reflect.Value, rules tagRules, path string) {
	entries, ok := d.entries(n, path)
	if !ok {
		return
	}
	if len(entries) < rules.minProperties {
		d.report(at(n), path, "is empty", "it needs at least one entry")
	}
	v.Set(reflect.MakeMap(v.Type()))
	for _, e := range entries {
		key := reflect.ValueOf(e.name)
		if v.Type().Key().Kind() == reflect.Int {
			whole, err := strconv.Atoi(e.name)
			if err != nil || whole < 0 || strconv.Itoa(whole) != e.name {
				d.report(e.at, path, fmt.Sprintf("%.40q is no class", e.name), "the keys here are the whole numbers of the raster's classes")
				continue
			}
			key = reflect.ValueOf(whole)
		}
		item := reflect.New(v.Type().Elem()).Elem()
		d.where[path+"."+e.name] = e.at
		d.value(e.node, item, tagRules{}, path+"."+e.name)
		v.SetMapIndex(key, item)
	}
}

// structure decodes a mapping with the keys of a struct.
func (d *decoder) structure(n ast.Node, v reflect.Value, path string) {
	entries, ok := d.entries(n, path)
	if !ok {
		return
	}
	d.fields(entries, at(n), v, path)
}

func (d *decoder) fields(entries []entry, place position, v reflect.Value, path string) {
	fields := fieldsOf(v.Type())
	given := map[string]bool{}
	for _, e := range entries {
		inner := join(path, e.name)
		i := slices.IndexFunc(fields, func(f field) bool { return f.key == e.name })
		if i < 0 {
			d.report(e.at, inner, "is not a key of a plan here", "the keys here are "+orList(keysOf(fields)))
			continue
		}
		given[e.name] = true
		d.where[inner] = e.at
		d.value(e.node, v.FieldByIndex(fields[i].index), fields[i].rules, inner)
	}
	for _, f := range fields {
		if f.required && !given[f.key] && !(path == "" && slices.Contains(d.optional, f.key)) {
			d.report(place, join(path, f.key), "is missing", "")
		}
	}
}

// An entry is one key of a mapping with its value.
type entry struct {
	name string
	at   position
	node ast.Node
}

// entries returns the keys of a mapping, refusing duplicates and merges.
func (d *decoder) entries(n ast.Node, path string) ([]entry, bool) {
	m, ok := n.(ast.MapNode)
	if !ok {
		d.report(at(n), path, describe(n)+" where a group of keys is due", "")
		return nil, false
	}
	var list []entry
	first := map[string]int{}
	for it := m.MapRange(); it.Next(); {
		e := entry{keyName(it.Key()), at(it.Key()), it.Value()}
		if _, merge := it.Key().(*ast.MergeKeyNode); merge {
			d.report(e.at, path, "merge keys are not taken in a plan", "write the keys out")
			continue
		}
		if line, dup := first[e.name]; dup {
			d.report(e.at, join(path, e.name), fmt.Sprintf("stands twice, first in line %d", line), "")
			continue
		}
		first[e.name] = e.at.line
		list = append(list, e)
	}
	return list, true
}

func keyName(k ast.MapKeyNode) string {
	switch key := k.(type) {
	case *ast.StringNode:
		return key.Value
	default:
		return strings.TrimSpace(k.GetToken().Value)
	}
}

func join(path, key string) string {
	if path == "" {
		return key
	}
	return path + "." + key
}

// describe names a node for an error.
func describe(n ast.Node) string {
	switch x := n.(type) {
	case nil, *ast.NullNode:
		return "nothing"
	case *ast.StringNode:
		return fmt.Sprintf("%.40q", x.Value)
	case *ast.IntegerNode, *ast.FloatNode, *ast.BoolNode, *ast.InfinityNode, *ast.NanNode:
		return n.GetToken().Value
	case *ast.SequenceNode:
		return "a list"
	case *ast.AliasNode, *ast.AnchorNode, *ast.TagNode:
		return "an anchor, alias or tag, which plans do not use,"
	case ast.MapNode:
		return "a group of keys"
	}
	return "this"
}
