package plan

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"slices"
	"strconv"

	"github.com/goccy/go-yaml/ast"
)

// What a plan or a JSON value holds, whatever it is written like: nil, bool, float64, string, []any
// for a list, group for keys with values. Two texts that say the same have equal trees.
type (
	group []pair
	pair  struct {
		key   string
		value any
	}
)

// find returns the index of a key, or -1.
func (g group) find(key string) int {
	return slices.IndexFunc(g, func(p pair) bool { return p.key == key })
}

// unknown is a node that no plan has; it equals nothing but itself.
type unknown struct{ node ast.Node }

func treeOf(n ast.Node) any {
	switch x := n.(type) {
	case nil, *ast.NullNode:
		return nil
	case *ast.StringNode:
		return x.Value
	case *ast.LiteralNode:
		return x.Value.Value
	case *ast.BoolNode:
		return x.Value
	case *ast.IntegerNode, *ast.FloatNode:
		if v, ok := number(n); ok {
			return v
		}
	case *ast.SequenceNode:
		list := make([]any, len(x.Values))
		for i, v := range x.Values {
			list[i] = treeOf(v)
		}
		return list
	case *ast.MappingNode, *ast.MappingValueNode:
		g := group{}
		for _, e := range entriesOf(n) {
			g = append(g, pair{keyName(e.Key), treeOf(e.Value)})
		}
		return g
	}
	return unknown{n}
}

// jsonTree reads a JSON value, keys in their order.
func jsonTree(text json.RawMessage) (any, error) {
	switch {
	case len(text) == 0:
		return nil, errors.New("the value is missing")
	case !json.Valid(text):
		return nil, errors.New("the value is not JSON")
	}
	return jsonValue(json.NewDecoder(bytes.NewReader(text)), 0)
}

// jsonValue reads the next value of valid JSON.
func jsonValue(d *json.Decoder, depth int) (any, error) {
	if depth > maxNesting {
		return nil, fmt.Errorf("the value is nested deeper than %d levels", maxNesting)
	}
	t, err := d.Token()
	if err != nil {
		return nil, fmt.Errorf("the value cannot be taken: %w", err) // a number too large
	}
	switch t {
	case json.Delim('['):
		list := []any{}
		for d.More() {
			v, err := jsonValue(d, depth+1)
			if err != nil {
				return nil, err
			}
			list = append(list, v)
		}
		_, err = d.Token()
		return list, err
	case json.Delim('{'):
		g := group{}
		for d.More() {
			if g, err = g.read(d, depth); err != nil {
				return nil, err
			}
		}
		_, err = d.Token()
		return g, err
	}
	return t, nil
}

// read adds a key and its value.
func (g group) read(d *json.Decoder, depth int) (group, error) {
	t, err := d.Token()
	if err != nil {
		return nil, err
	}
	key := t.(string) // JSON has no other keys
	if g.find(key) >= 0 {
		return nil, fmt.Errorf("the key %.40q stands twice", key)
	}
	v, err := jsonValue(d, depth+1)
	return append(g, pair{key, v}), err
}

// treeEdited returns what a tree becomes by an edit, or why it cannot be made. The tree itself stays.
func treeEdited(tree any, do string, path []string, value any) (any, error) {
	if len(path) == 0 {
		if do != AddEntry {
			return nil, fmt.Errorf("%s needs a path", do)
		}
		list, ok := tree.([]any)
		if !ok && tree != nil {
			return nil, errors.New("there is no list at the path")
		}
		return append(slices.Clone(list), value), nil
	}
	step, last := path[0], len(path) == 1 && do != AddEntry
	switch parent := tree.(type) {
	case group:
		return groupEdited(parent, do, path, value)
	case []any:
		i := indexOf(parent, step)
		if i < 0 {
			return nil, fmt.Errorf("the list has no entry %.40q: name one, or count from 0 to %d", step, len(parent)-1)
		}
		out := slices.Clone(parent)
		switch {
		case last && do == RemoveKey:
			return slices.Delete(out, i, i+1), nil
		case last:
			out[i] = value
			return out, nil
		}
		var err error
		out[i], err = treeEdited(parent[i], do, path[1:], value)
		return out, err
	case nil:
		return groupEdited(group{}, do, path, value)
	}
	return nil, fmt.Errorf("%.40q leads below a single value", step)
}

func groupEdited(g group, do string, path []string, value any) (any, error) {
	step, last := path[0], len(path) == 1 && do != AddEntry
	out, i := slices.Clone(g), g.find(step)
	switch {
	case do == RemoveKey && i < 0:
		return nil, fmt.Errorf("there is no %.40q", step)
	case do == RemoveKey && last:
		return slices.Delete(out, i, i+1), nil
	case i < 0:
		out, i = append(out, pair{step, nil}), len(out)
	}
	if last && do == SetKey {
		out[i].value = value
		return out, nil
	}
	var err error
	out[i].value, err = treeEdited(out[i].value, do, path[1:], value)
	return out, err
}

// indexOf finds an entry of a list by its name, or else by its index; -1 where there is none.
func indexOf(list []any, step string) int {
	for i, v := range list {
		if g, ok := v.(group); ok {
			if k := g.find("name"); k >= 0 && g[k].value == step {
				return i
			}
		}
	}
	if i, err := strconv.Atoi(step); err == nil && i >= 0 && i < len(list) && strconv.Itoa(i) == step {
		return i
	}
	return -1
}
