package plan

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"reflect"
	"strings"

	"github.com/goccy/go-yaml/ast"
)

// An Edit is one change to the text of a plan.
type Edit struct {
	// Do is what to do at the path: [SetKey], [AddEntry] or [RemoveKey].
	Do string
	// Path leads there from the top of the plan: keys, and in lists an entry's `name` or its index
	// from 0, as in "sites", "Gauge 3", "antenna", "above_ground".
	Path []string
	// Value is a JSON value for what is set or added; its keys keep their order.
	Value json.RawMessage
}

// What an [Edit] can do.
const (
	SetKey    = "set"    // put a value in the place of another, or under a new key
	AddEntry  = "add"    // put an entry at the end of a list
	RemoveKey = "remove" // take a key with its value, or an entry, away
)

// MaxEdits bounds the changes of one call of [EditText].
const MaxEdits = 1000

// EditText changes the text of a plan and leaves all else in it as it stands: comments, order,
// spacing. It works on any YAML that a plan may be; whether the result is a good plan, [Parse] tells.
// Every change is checked by reading the new text back: it holds what was asked for and nothing else
// has changed, or there is an error, and no text.
func EditText(text []byte, edits ...Edit) ([]byte, error) {
	if len(edits) > MaxEdits {
		return nil, fmt.Errorf("%d edits at once are too many: at most %d", len(edits), MaxEdits)
	}
	windows := bytes.Count(text, []byte("\n")) > 0 && bytes.Count(text, []byte("\n")) == bytes.Count(text, []byte("\r\n"))
	if windows {
		text = bytes.ReplaceAll(text, []byte("\r\n"), []byte("\n"))
	}
	s, err := readSource(text)
	for i := 0; err == nil && i < len(edits); i++ {
		if s, err = s.edited(edits[i]); err != nil {
			err = fmt.Errorf("edit %d, %s %s: %w", i+1, edits[i].Do, strings.Join(edits[i].Path, " / "), err)
		}
	}
	if err != nil {
		return nil, err
	}
	text = []byte(s.text)
	if windows {
		text = bytes.ReplaceAll(text, []byte("\n"), []byte("\r\n"))
	}
	return text, nil
}

// readSource parses a text without regard to what a plan may hold.
func readSource(text []byte) (*source, error) {
	d := &decoder{}
	root := d.tree(text)
	if root == nil {
		return nil, d.errs.sorted()
	}
	return newSource(string(text), root), nil
}

// edited returns the source after a change, read back and compared with what was to come of it.
func (s *source) edited(e Edit) (*source, error) {
	var value any
	var err error
	switch e.Do {
	case SetKey, AddEntry:
		value, err = jsonTree(e.Value)
	case RemoveKey:
	default:
		err = fmt.Errorf("what to do is %s, %s or %s", SetKey, AddEntry, RemoveKey)
	}
	if err != nil {
		return nil, err
	}
	want, err := treeEdited(treeOf(s.root), e.Do, e.Path, value)
	if err != nil {
		return nil, err
	}
	text, err := s.rewritten(e.Do, e.Path, value)
	if err != nil {
		return nil, err
	}
	after, err := readSource([]byte(text))
	if err != nil || !reflect.DeepEqual(treeOf(after.root), want) {
		return nil, errWriting
	}
	return after, nil
}

// errWriting is a way of writing YAML that is not understood well enough to change it.
var errWriting = errors.New("the plan is written in a way here that cannot be changed safely: edit it in an editor")

// rewritten carries a change out on the text; that it can be, the tree has shown.
func (s *source) rewritten(do string, path []string, value any) (string, error) {
	var place span
	var text string
	n, parent, left := s.descend(path)
	var err error
	switch {
	case do == RemoveKey:
		place, text, err = s.removal(parent, path[len(path)-1])
	case do == AddEntry && len(left) == 0:
		if list, ok := n.(*ast.SequenceNode); ok {
			place, text, err = s.addition(list, value)
		} else {
			place, text, err = s.replacement(parent, path[len(path)-1], []any{value})
		}
	case do == AddEntry:
		value = []any{value}
		fallthrough
	case len(left) > 0:
		for i := len(left) - 1; i > 0; i-- {
			value = group{{left[i], value}}
		}
		place, text, err = s.prolongation(n, parent, path[:len(path)-len(left)], left[0], value)
	default:
		place, text, err = s.replacement(parent, path[len(path)-1], value)
	}
	if err != nil {
		return "", err
	}
	return s.text[:place.from] + text + s.text[place.to:], nil
}

// descend follows a path as far as there are nodes. parent holds n; left is what the plan lacks.
func (s *source) descend(path []string) (n, parent ast.Node, left []string) {
	n = s.root
	for i, step := range path {
		child := childOf(n, step)
		if child == nil {
			return n, parent, path[i:]
		}
		n, parent = child, n
	}
	return n, parent, nil
}

// childOf returns the value under a key of a group, or an entry of a list, nil where there is none.
func childOf(n ast.Node, step string) ast.Node {
	if list, ok := n.(*ast.SequenceNode); ok {
		if i := indexOf(treeOf(list).([]any), step); i >= 0 {
			return list.Values[i]
		}
		return nil
	}
	for _, e := range entriesOf(n) {
		if keyName(e.Key) == step {
			return e.Value
		}
	}
	return nil
}

// entriesOf lists the keys of a group with their values.
func entriesOf(n ast.Node) []*ast.MappingValueNode {
	switch m := n.(type) {
	case *ast.MappingNode:
		return m.Values
	case *ast.MappingValueNode:
		return []*ast.MappingValueNode{m}
	}
	return nil
}
