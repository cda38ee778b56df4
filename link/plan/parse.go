package plan

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"unicode/utf8"

	"github.com/goccy/go-yaml"
	"github.com/goccy/go-yaml/ast"
	"github.com/goccy/go-yaml/lexer"
	"github.com/goccy/go-yaml/parser"
	"github.com/goccy/go-yaml/token"
)

// Limits of a plan file, against files that are no plans. A plan of 1,000 links has about 300 kB
// and 100,000 tokens; the YAML parser's time grows with the square of the tokens.
const (
	maxBytes   = 1 << 20
	maxTokens  = 250_000
	maxNesting = 32
)

// Load reads and parses a plan file.
func Load(path string) (*Plan, error) { return load(path, Parse) }

// LoadAntennas reads and parses a plan file of which only the channels and antennas are wanted: it
// may lack ground, sites and links.
func LoadAntennas(path string) (*Plan, error) { return load(path, ParseAntennas) }

func load(path string, parse func(name string, data []byte) (*Plan, error)) (*Plan, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	data, err := io.ReadAll(io.LimitReader(f, maxBytes+1))
	if err != nil {
		return nil, err
	}
	return parse(path, data)
}

// Parse reads a plan, checks it whole and fills in its defaults. The error is an [Errors] with
// all that is wrong. The name is the file's path: other paths in the plan are relative to its
// folder. Parse opens no file.
func Parse(name string, data []byte) (*Plan, error) { return (&decoder{file: name}).parse(data) }

// ParseAntennas is Parse for a plan that may lack ground, sites and links.
func ParseAntennas(name string, data []byte) (*Plan, error) {
	return (&decoder{file: name, optional: []string{"ground", "sites", "links"}}).parse(data)
}

func (d *decoder) parse(data []byte) (*Plan, error) {
	d.where = map[string]position{}
	p := &Plan{file: d.file, where: d.where}
	if body := d.tree(data); body != nil {
		d.value(body, reflect.ValueOf(p).Elem(), tagRules{}, "")
	}
	if len(d.errs) == 0 {
		p.fillDefaults()
		d.errs = p.check()
	}
	if len(d.errs) > 0 {
		return nil, d.errs.sorted()
	}
	return p, nil
}

// tree returns the body of the file's one document, or nil after reporting why there is none.
func (d *decoder) tree(data []byte) ast.Node {
	if at, problem := unreadable(data); problem != "" {
		d.report(at, "", problem, "")
		return nil
	}
	// The lexer counts the lines of a comment that ends in a carriage return twice.
	tokens := lexer.Tokenize(strings.ReplaceAll(string(data), "\r\n", "\n"))
	if !d.plain(tokens) {
		return nil
	}
	file, err := parser.Parse(tokens, 0, parser.AllowDuplicateMapKey())
	if err != nil {
		d.syntax(err)
		return nil
	}
	if len(file.Docs) != 1 || file.Docs[0].Body == nil {
		d.report(position{1, 1}, "", "is empty or holds several documents", "a plan is one YAML document; `fellreach plan new` writes a starter")
		return nil
	}
	return file.Docs[0].Body
}

// syntax reports the YAML parser's own error with its place.
func (d *decoder) syntax(err error) {
	var bad yaml.Error
	if !errors.As(err, &bad) || bad.GetToken() == nil {
		d.report(position{1, 1}, "", "is not YAML: "+err.Error(), "")
		return
	}
	p := bad.GetToken().Position
	d.report(position{p.Line, p.Column}, "", "is not YAML: "+bad.GetMessage(), "")
}

// unreadable finds what keeps a file from being read at all.
func unreadable(data []byte) (position, string) {
	if len(data) > maxBytes {
		return position{1, 1}, fmt.Sprintf("is larger than a plan may be, %d MiB", maxBytes>>20)
	}
	for i, line := range bytes.Split(data, []byte("\n")) {
		if !utf8.Valid(line) || bytes.IndexByte(line, 0) >= 0 {
			return position{i + 1, 1}, "is not UTF-8 text"
		}
		indent := len(line) - len(bytes.TrimLeft(line, " -?:\t"))
		if indent > 8*maxNesting {
			return position{i + 1, 1}, fmt.Sprintf("is indented deeper than %d columns", 8*maxNesting)
		}
	}
	return position{}, ""
}

// plain refuses what plans do not use and what could make a small file grow without bound:
// anchors, aliases, tags, merge keys, deep nesting.
func (d *decoder) plain(tokens token.Tokens) bool {
	if len(tokens) > maxTokens {
		d.report(position{1, 1}, "", fmt.Sprintf("has more than %d words and signs", maxTokens), "split the plan")
		return false
	}
	depth := 0
	for _, t := range tokens {
		switch t.Type {
		case token.AnchorType, token.AliasType, token.TagType, token.MergeKeyType:
			d.report(position{t.Position.Line, t.Position.Column}, "", fmt.Sprintf("%q: plans do not use anchors, aliases, tags or merge keys", strings.TrimSpace(t.Value)), "write the value out, or quote it if it is a text")
			return false
		case token.SequenceStartType, token.MappingStartType:
			if depth++; depth > maxNesting {
				d.report(position{t.Position.Line, t.Position.Column}, "", fmt.Sprintf("is nested deeper than %d levels", maxNesting), "")
				return false
			}
		case token.SequenceEndType, token.MappingEndType:
			depth--
		}
	}
	return true
}

// resolvePath returns a path of the plan as the program can open it.
func (p *Plan) resolvePath(path string) string {
	if filepath.IsAbs(path) {
		return path
	}
	return filepath.Join(filepath.Dir(p.file), path)
}

// source names the line of the plan that a value stands in, for a budget: "hallin.yaml:31". The
// most specific part of the path that the file holds counts.
func (p *Plan) source(path string) string {
	for {
		if at, ok := p.where[path]; ok && path != "" {
			return fmt.Sprintf("%s:%d", filepath.Base(p.file), at.line)
		}
		cut := strings.LastIndexAny(path, ".[")
		if cut < 0 {
			return filepath.Base(p.file)
		}
		path = path[:cut]
	}
}
