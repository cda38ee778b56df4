package plan

import (
	"encoding/json"
	"regexp"
	"slices"
	"strconv"
	"strings"

	"github.com/goccy/go-yaml/ast"
)

// replacement puts a value in the place of that of a key or entry.
func (s *source) replacement(parent ast.Node, step string, value any) (span, string, error) {
	if list, ok := parent.(*ast.SequenceNode); ok {
		old := list.Values[indexOf(treeOf(list).([]any), step)]
		from, err := s.start(old)
		if err != nil {
			return span{}, "", err
		}
		to, err := s.end(old)
		return span{from, to}, flow(value), err
	}
	e := entryOf(parent, step)
	colon, err := s.after(e.Start)
	if err != nil {
		return span{}, "", err
	}
	to, err := s.entryEnd(e)
	if err != nil || isEmpty(e.Value) || isBlock(e.Value) {
		return span{colon, to}, " " + flow(value), err
	}
	from, err := s.start(e.Value)
	return span{from, to}, flow(value), err
}

func entryOf(n ast.Node, key string) *ast.MappingValueNode {
	entries := entriesOf(n)
	i := slices.IndexFunc(entries, func(e *ast.MappingValueNode) bool { return keyName(e.Key) == key })
	return entries[i]
}

// prolongation adds a key with a value to a group; where there is nothing yet, a group of it.
func (s *source) prolongation(n, parent ast.Node, path []string, key string, value any) (span, string, error) {
	added := flowKey(key) + ": " + flow(value)
	entries := entriesOf(n)
	switch {
	case isFlow(n) && len(entries) == 0:
		at, err := s.after(n.GetToken())
		return span{at, at}, added, err
	case isFlow(n):
		at, err := s.entryEnd(entries[len(entries)-1])
		return span{at, at}, ", " + added, err
	case len(entries) > 0:
		first, err := s.start(n)
		if err != nil {
			return span{}, "", err
		}
		at, err := s.end(n)
		at = s.lineEnd(at)
		return span{at, at}, "\n" + strings.Repeat(" ", s.column(first)) + added, err
	}
	if len(path) == 0 {
		return span{}, "", errWriting
	}
	return s.replacement(parent, path[len(path)-1], group{{key, value}})
}

// addition adds an entry to a list, written as its last entry is.
func (s *source) addition(list *ast.SequenceNode, value any) (span, string, error) {
	if len(list.Values) == 0 {
		at, err := s.after(list.Start)
		return span{at, at}, flow(value), err
	}
	last := list.Values[len(list.Values)-1]
	at, err := s.end(last)
	if err != nil {
		return span{}, "", err
	}
	if list.IsFlowStyle {
		return span{at, at}, ", " + flow(value), nil
	}
	dash, err := s.offset(list.Entries[0].Start.Position)
	if err != nil {
		return span{}, "", err
	}
	indent := "\n" + strings.Repeat(" ", s.column(dash))
	at = s.lineEnd(at)
	g, isGroup := value.(group)
	if !isGroup || !isBlock(last) || len(g) == 0 {
		return span{at, at}, indent + "- " + flow(value), nil
	}
	var b strings.Builder
	for i, p := range g {
		lead := "  "
		if i == 0 {
			lead = "- "
		}
		b.WriteString(indent + lead + flowKey(p.key) + ": " + flow(p.value))
	}
	return span{at, at}, b.String(), nil
}

// A part of a group or list is an entry's beginning (its key, its dash) and its end.
func (s *source) parts(n ast.Node) ([]span, error) {
	var all []span
	add := func(from int, err error, end func() (int, error)) error {
		if err != nil {
			return err
		}
		to, err := end()
		all = append(all, span{from, to})
		return err
	}
	if list, ok := n.(*ast.SequenceNode); ok {
		for i, v := range list.Values {
			from, err := s.start(v)
			if !list.IsFlowStyle {
				from, err = s.offset(list.Entries[i].Start.Position)
			}
			if err := add(from, err, func() (int, error) { return s.end(v) }); err != nil {
				return nil, err
			}
		}
		return all, nil
	}
	for _, e := range entriesOf(n) {
		from, err := s.offset(e.Key.GetToken().Position)
		if err := add(from, err, func() (int, error) { return s.entryEnd(e) }); err != nil {
			return nil, err
		}
	}
	return all, nil
}

// removal takes an entry away. The last one of a group or list leaves it empty.
func (s *source) removal(parent ast.Node, step string) (span, string, error) {
	parts, err := s.parts(parent)
	if err != nil {
		return span{}, "", err
	}
	i, empty := 0, "{}"
	if list, ok := parent.(*ast.SequenceNode); ok {
		i, empty = indexOf(treeOf(list).([]any), step), "[]"
	} else {
		i = slices.IndexFunc(entriesOf(parent), func(e *ast.MappingValueNode) bool { return keyName(e.Key) == step })
	}
	switch {
	case len(parts) == 1:
		from, err := s.start(parent)
		if err != nil {
			return span{}, "", err
		}
		to, err := s.end(parent)
		return span{from, to}, empty, err
	case isFlow(parent) && i > 0:
		return span{parts[i-1].to, parts[i].to}, "", nil
	case i == 0 && (isFlow(parent) || strings.TrimSpace(s.text[s.lineStart(parts[0].from):parts[0].from]) != ""):
		return span{parts[0].from, parts[1].from}, "", nil
	}
	from, to := s.lineStart(parts[i].from), s.lineEnd(parts[i].to)
	if to < len(s.text) {
		to += strings.IndexByte(s.text[to:], '\n') + 1
	}
	return span{from, to}, "", nil
}

// flow writes a value on one line.
func flow(value any) string {
	switch v := value.(type) {
	case nil:
		return "null"
	case bool:
		return strconv.FormatBool(v)
	case float64:
		return strconv.FormatFloat(v, 'f', -1, 64)
	case string:
		return flowText(v)
	case []any:
		parts := make([]string, len(v))
		for i := range v {
			parts[i] = flow(v[i])
		}
		return "[" + strings.Join(parts, ", ") + "]"
	case group:
		parts := make([]string, len(v))
		for i := range v {
			parts[i] = flowKey(v[i].key) + ": " + flow(v[i].value)
		}
		return "{" + strings.Join(parts, ", ") + "}"
	}
	panic("plan: a tree holds no such value")
}

// plainText is what needs no quotes anywhere: words that are neither numbers nor YAML's own.
var (
	plainText = regexp.MustCompile(`^[A-Za-z][A-Za-z0-9_/-]*(?: [A-Za-z0-9][A-Za-z0-9_/.-]*)*$`)
	ownWords  = regexp.MustCompile(`(?i)^(?:y|n|yes|no|on|off|true|false|null|nan|inf)$`)
)

func flowText(text string) string {
	if plainText.MatchString(text) && !ownWords.MatchString(text) {
		return text
	}
	return quoted(text)
}

// flowKey writes a key; texts that are whole numbers stay so, for the classes of a cover raster.
func flowKey(key string) string {
	if n, err := strconv.Atoi(key); err == nil && strconv.Itoa(n) == key {
		return key
	}
	return flowText(key)
}

// quoted writes a text in double quotes, as JSON and YAML both have them.
func quoted(text string) string {
	var b strings.Builder
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	_ = e.Encode(text) // a string always has an encoding
	return strings.TrimSuffix(b.String(), "\n")
}
