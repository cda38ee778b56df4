package plan

import (
	"strings"
	"unicode/utf8"

	"github.com/goccy/go-yaml/ast"
	"github.com/goccy/go-yaml/token"
)

// A source is the text of a plan with its syntax tree.
type source struct {
	text  string
	root  ast.Node
	lines []int // where each line begins
}

// A span is a part of the text.
type span struct{ from, to int }

func newSource(text string, root ast.Node) *source {
	s := &source{text: text, root: root, lines: []int{0}}
	for i := range len(text) {
		if text[i] == '\n' {
			s.lines = append(s.lines, i+1)
		}
	}
	return s
}

// offset turns a place, counted in lines and characters, into one in the text.
func (s *source) offset(p *token.Position) (int, error) {
	if p == nil || p.Line < 1 || p.Line > len(s.lines) {
		return 0, errWriting
	}
	at := s.lines[p.Line-1]
	for range p.Column - 1 {
		_, size := utf8.DecodeRuneInString(s.text[at:])
		at += size
	}
	return at, nil
}

// isFlow tells whether a group or list is written in brackets.
func isFlow(n ast.Node) bool {
	switch x := n.(type) {
	case *ast.MappingNode:
		return x.IsFlowStyle
	case *ast.SequenceNode:
		return x.IsFlowStyle
	}
	return false
}

// isBlock tells whether a group or list is written in lines of its own.
func isBlock(n ast.Node) bool {
	_, list := n.(*ast.SequenceNode)
	return (list || entriesOf(n) != nil) && !isFlow(n)
}

// start returns where a node begins in the text.
func (s *source) start(n ast.Node) (int, error) {
	if entries := entriesOf(n); len(entries) > 0 && !isFlow(n) {
		return s.offset(entries[0].Key.GetToken().Position)
	}
	if list, ok := n.(*ast.SequenceNode); ok && !list.IsFlowStyle {
		return s.offset(list.Entries[0].Start.Position)
	}
	return s.offset(n.GetToken().Position)
}

// end returns where a node ends in the text.
func (s *source) end(n ast.Node) (int, error) {
	switch x := n.(type) {
	case *ast.MappingNode:
		if x.IsFlowStyle {
			return s.after(x.End)
		}
	case *ast.SequenceNode:
		if x.IsFlowStyle {
			return s.after(x.End)
		}
		return s.end(x.Values[len(x.Values)-1])
	}
	if entries := entriesOf(n); len(entries) > 0 {
		return s.entryEnd(entries[len(entries)-1])
	}
	return s.scalarEnd(n)
}

// after returns the place after a bracket.
func (s *source) after(bracket *token.Token) (int, error) {
	if bracket == nil {
		return 0, errWriting
	}
	at, err := s.offset(bracket.Position)
	return at + 1, err
}

// entryEnd returns where a key with its value ends.
func (s *source) entryEnd(e *ast.MappingValueNode) (int, error) {
	if isEmpty(e.Value) {
		return s.after(e.Start)
	}
	return s.end(e.Value)
}

// isEmpty tells whether nothing at all is written for a value.
func isEmpty(n ast.Node) bool {
	null, ok := n.(*ast.NullNode)
	return n == nil || ok && null.GetToken().Type == token.ImplicitNullType
}

// scalarEnd returns where a single value ends. One that goes over several lines is refused.
func (s *source) scalarEnd(n ast.Node) (int, error) {
	t := n.GetToken()
	at, err := s.offset(t.Position)
	if err != nil {
		return 0, err
	}
	rest := s.text[at:]
	switch t.Type {
	case token.DoubleQuoteType, token.SingleQuoteType:
		if size := quotedSize(rest); size > 0 {
			return at + size, nil
		}
	default:
		if t.Value != "" && strings.HasPrefix(rest, t.Value) {
			return at + len(t.Value), nil
		}
	}
	return 0, errWriting
}

// quotedSize returns the size of the quoted text at the beginning of a line, 0 if it does not end.
func quotedSize(text string) int {
	if text == "" {
		return 0
	}
	quote := text[0]
	for i := 1; i < len(text) && text[i] != '\n'; i++ {
		switch {
		case quote == '"' && text[i] == '\\':
			i++
		case text[i] != quote:
		case quote == '\'' && i+1 < len(text) && text[i+1] == quote:
			i++
		default:
			return i + 1
		}
	}
	return 0
}

// lineStart and lineEnd return the borders of the line of a place; the end is before the line break.
func (s *source) lineStart(at int) int { return strings.LastIndexByte(s.text[:at], '\n') + 1 }

func (s *source) lineEnd(at int) int {
	end := strings.IndexByte(s.text[at:], '\n')
	if end < 0 {
		return len(s.text)
	}
	return at + end
}

// column returns how many characters stand before a place in its line.
func (s *source) column(at int) int { return utf8.RuneCountInString(s.text[s.lineStart(at):at]) }
