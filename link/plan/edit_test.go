package plan

import (
	"encoding/json"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func path(text string) []string { return strings.Split(text, "|") }

func set(at, value string) Edit { return Edit{SetKey, path(at), json.RawMessage(value)} }
func add(at, value string) Edit { return Edit{AddEntry, path(at), json.RawMessage(value)} }
func remove(at string) Edit     { return Edit{Do: RemoveKey, Path: path(at)} }

// written is a text in the ways that people write plans.
const written = `# Two gauges. Ü
format: 1
ground: {elevation: {files: [a.tif]}}   # the ground
sites:
  - name: Base "Ü"       # by the shore
    at: UTM 27N 591350 5250250
    mast: {kind: pole, height: "18 m"}

    # what hangs there
    stations:
      coast:
        antenna: {use: rod, above_ground: "16 m"} # rod
        inserts: [{name: arrestor, loss: "0.1 dB"}]
  - name: Gauge 3
    at: {epsg: 32627, easting: 602255, northing: 5255785}
    antenna:
      use: 'the ''rod'''
      above_ground: "4 m"
# the links
links:
  - {from: Gauge 3, to: Base}
  - {from: A, to: B}   # the last
empty:
list: []
`

// TestEditText holds each change against the lines that it is to alter, all others staying.
func TestEditText(t *testing.T) {
	for _, tc := range []struct {
		name     string
		edit     Edit
		old, new string // of the text
	}{
		{"a quoted value", set("sites|Base \"Ü\"|stations|coast|antenna|above_ground", `"17.5 m"`), `above_ground: "16 m"}`, `above_ground: "17.5 m"}`},
		{"a plain value", set("sites|0|at", `"47.5 N, 20.1 W"`), `at: UTM 27N 591350 5250250`, `at: "47.5 N, 20.1 W"`},
		{"a plain value by another", set("sites|0|at", `"UTM 27N 1 2"`), `at: UTM 27N 591350 5250250`, `at: UTM 27N 1 2`},
		{"a group by a text", set("sites|Gauge 3|at", `"1 N, 2 W"`), `{epsg: 32627, easting: 602255, northing: 5255785}`, `"1 N, 2 W"`},
		{"a number in a group", set("sites|Gauge 3|at|easting", `602255.5`), `easting: 602255,`, `easting: 602255.5,`},
		{"a lines group by a text", set("sites|Gauge 3|antenna", `"x"`), "antenna:\n      use: 'the ''rod'''\n      above_ground: \"4 m\"\n", "antenna: x\n"},
		{"a value in single quotes", set("sites|Gauge 3|antenna|use", `"beam"`), `'the ''rod'''`, `beam`},
		{"a new key in brackets", set("sites|0|stations|coast|antenna|tilt", `"2 deg"`), `"16 m"} # rod`, `"16 m", tilt: "2 deg"} # rod`},
		{"a new key in lines", set("sites|Gauge 3|antenna|facing", `"toward Base"`), "above_ground: \"4 m\"\n", "above_ground: \"4 m\"\n      facing: toward Base\n"},
		{"a new group", set("sites|Gauge 3|feeder|length", `"6 m"`), "above_ground: \"4 m\"\n", "above_ground: \"4 m\"\n    feeder: {length: \"6 m\"}\n"},
		{"a value where there is none", set("empty", `true`), "empty:\n", "empty: true\n"},
		{"a key where there is no value", set("empty|key", `"on"`), "empty:\n", "empty: {key: \"on\"}\n"},
		{"a new key at the top", set("aim|margin", `"6 dB"`), "list: []\n", "list: []\naim: {margin: \"6 dB\"}\n"},
		{"a link", add("links", `{"from":"Gauge 3","to":"Base/coast","channel":"c"}`), "# the last\n", "# the last\n  - {from: Gauge 3, to: Base/coast, channel: c}\n"},
		{"a site", add("sites", `{"name":"New hut","at":"1 N, 2 W","antenna":{"use":"rod"}}`), "above_ground: \"4 m\"\n", "above_ground: \"4 m\"\n  - name: New hut\n    at: \"1 N, 2 W\"\n    antenna: {use: rod}\n"},
		{"an insert", add("sites|0|stations|coast|inserts", `{"name":"filter","loss":"1 dB"}`), `"0.1 dB"}]`, `"0.1 dB"}, {name: filter, loss: "1 dB"}]`},
		{"the first of a list", add("list", `3`), "list: []", "list: [3]"},
		{"the first of no list", add("empty", `[true,null,"null"]`), "empty:", `empty: [[true, null, "null"]]`},
		{"a list in a new group", add("sites|Gauge 3|more|things", `"x"`), "above_ground: \"4 m\"\n", "above_ground: \"4 m\"\n    more: {things: [x]}\n"},
		{"no link", remove("links|0"), "  - {from: Gauge 3, to: Base}\n", ""},
		{"no last link", remove("links|1"), "  - {from: A, to: B}   # the last\n", ""},
		{"no site", remove("sites|Gauge 3"), written[strings.Index(written, "  - name: Gauge 3"):strings.Index(written, "# the links")], ""},
		{"no key in brackets", remove("sites|0|mast|kind"), `{kind: pole, height`, `{height`},
		{"no last key in brackets", remove("sites|0|mast|height"), `pole, height: "18 m"}`, `pole}`},
		{"no key in lines", remove("sites|0|at"), "    at: UTM 27N 591350 5250250\n", ""},
		{"no first key of an entry", remove("sites|Gauge 3|name"), "name: Gauge 3\n    at", "at"},
		{"no only entry", remove("sites|0|stations|coast|inserts|arrestor"), `[{name: arrestor, loss: "0.1 dB"}]`, `[]`},
		{"no only key in lines", remove("sites|0|stations|coast"), "coast:\n        antenna: {use: rod, above_ground: \"16 m\"} # rod\n        inserts: [{name: arrestor, loss: \"0.1 dB\"}]\n", "{}\n"},
		{"an entry by another", set("links|1", `{"from":"C"}`), `{from: A, to: B}   # the last`, `{from: C}   # the last`},
	} {
		for _, eol := range []string{"\n", "\r\n"} {
			ended := func(text string) string { return strings.ReplaceAll(text, "\n", eol) }
			if strings.Count(written, tc.old) != 1 {
				t.Fatalf("%s: the old text stands %d times", tc.name, strings.Count(written, tc.old))
			}
			got, err := EditText([]byte(ended(written)), tc.edit)
			if want := ended(strings.Replace(written, tc.old, tc.new, 1)); err != nil || string(got) != want {
				t.Errorf("%s (%q): %v, got:\n%s\nwant:\n%s", tc.name, eol, err, got, want)
			}
		}
	}
}

// TestEditTextRefuses names what is wrong with a change; no text comes of it.
func TestEditTextRefuses(t *testing.T) {
	literal := "a: |\n  one\n  two\nb: one\n  two\n"
	for _, tc := range []struct {
		name, text string
		edit       Edit
		want       string
	}{
		{"no such site", written, set("sites|Gauge 9|at", `"x"`), `no entry "Gauge 9"`},
		{"an index beyond", written, set("sites|2|at", `"x"`), "count from 0 to 1"},
		{"below a value", written, set("format|x", `1`), "below a single value"},
		{"no list", written, add("format", `1`), "no list"},
		{"nothing to take away", written, remove("sites|0|tilt"), `no "tilt"`},
		{"no path", written, Edit{Do: SetKey, Value: json.RawMessage("1")}, "needs a path"},
		{"nothing known to do", written, Edit{Do: "move", Path: path("format")}, "set, add or remove"},
		{"no value", written, Edit{Do: SetKey, Path: path("format")}, "missing"},
		{"no JSON", written, set("format", `{`), "not JSON"},
		{"two values", written, set("format", `1 2`), "not JSON"},
		{"a key twice", written, set("format", `{"a":1,"a":2}`), "twice"},
		{"too deep", written, set("format", strings.Repeat("[", 100)+strings.Repeat("]", 100)), "nested deeper"},
		{"several lines", literal, set("b", `"x"`), "edit it in an editor"},
		{"a literal", literal, set("a", `"x"`), "edit it in an editor"},
		{"no YAML", "a: [", set("a", `1`), "is not YAML"},
		{"an alias", "a: &x 1\nb: *x\n", set("b", `1`), "anchors"},
	} {
		got, err := EditText([]byte(tc.text), tc.edit)
		if err == nil || !strings.Contains(err.Error(), tc.want) || got != nil {
			t.Errorf("%s: %v, want an error with %q; text %.60q", tc.name, err, tc.want, got)
		}
	}
	if _, err := EditText([]byte(written), make([]Edit, MaxEdits+1)...); err == nil || !strings.Contains(err.Error(), "too many") {
		t.Errorf("too many edits: %v", err)
	}
}

// TestEditTextInTurn makes several changes of which each stands on the one before.
func TestEditTextInTurn(t *testing.T) {
	got, err := EditText([]byte(written),
		add("sites", `{"name":"Hut"}`), set("sites|Hut|at", `"1 N, 2 W"`), set("sites|Hut|name", `"Old hut"`), set("sites|Old hut|mast", `{"kind":"pole","height":"3 m"}`))
	want := strings.Replace(written, "above_ground: \"4 m\"\n", "above_ground: \"4 m\"\n  - name: Old hut\n    at: \"1 N, 2 W\"\n    mast: {kind: pole, height: \"3 m\"}\n", 1)
	if err != nil || string(got) != want {
		t.Errorf("%v, got:\n%s\nwant:\n%s", err, got, want)
	}
}

// TestEditTextProperty sets and takes away values of any kind all over real plans: what the plan holds
// is changed as asked, an edit undone gives the tree back, and the comments of lines that are not
// touched stay.
func TestEditTextProperty(t *testing.T) {
	var texts []string
	for _, name := range []string{filepath.Join("..", "..", "cmd", "fellreach", "hallin.yaml"), filepath.Join("..", "..", "testdata", "plans", "every-key.yaml")} {
		text, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		texts = append(texts, string(text))
	}
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.SampledFrom(texts).Draw(t, "text")
		before, err := readSource([]byte(text))
		if err != nil {
			t.Fatal(err)
		}
		tree := treeOf(before.root)
		at, old := somewhere(t, tree, nil)
		value := rapid.SampledFrom([]string{`"7 m"`, `"plain words"`, `"#a: {b}, [c] \"d\" 'e' é 🗻\n"`, `"12"`, `12`, `-0.5`, `true`, `null`, `[]`, `{}`, `[1,{"k":"v"}]`, `{"a b":{"c":[]}}`, `""`, `" x "`, `"~"`, `"1e5"`}).Draw(t, "value")
		got, err := EditText([]byte(text), Edit{SetKey, at, json.RawMessage(value)})
		if err != nil {
			t.Fatalf("setting %q to %s: %v", at, value, err)
		}
		back, err := EditText(got, Edit{SetKey, at, jsonOf(old)})
		if err != nil {
			t.Fatalf("setting %q back: %v", at, err)
		}
		again, err := readSource(back)
		if err != nil || !reflect.DeepEqual(treeOf(again.root), tree) {
			t.Fatalf("%q is not as it was: %v", at, err)
		}
		if a, b := strings.Count(text, "\n"), strings.Count(string(got), "\n"); a == b && strings.Count(text, "#") > strings.Count(string(got), "#") {
			t.Fatalf("a comment is lost:\n%s", got)
		}
		if _, err := EditText(got, Edit{Do: RemoveKey, Path: at}); err != nil {
			t.Fatalf("removing %q: %v", at, err)
		}
	})
}

// somewhere draws a path in a tree, with the value there.
func somewhere(t *rapid.T, tree any, at []string) ([]string, any) {
	if len(at) > 0 && rapid.Bool().Draw(t, "here") {
		return at, tree
	}
	switch x := tree.(type) {
	case group:
		if len(x) > 0 {
			p := rapid.SampledFrom(x).Draw(t, "key")
			return somewhere(t, p.value, append(at[:len(at):len(at)], p.key))
		}
	case []any:
		if len(x) > 0 {
			i := rapid.IntRange(0, len(x)-1).Draw(t, "index")
			return somewhere(t, x[i], append(at[:len(at):len(at)], flow(float64(i))))
		}
	}
	return at, tree
}

// jsonOf writes a tree as JSON.
func jsonOf(tree any) json.RawMessage {
	switch x := tree.(type) {
	case group:
		var parts []string
		for _, p := range x {
			parts = append(parts, quoted(p.key)+":"+string(jsonOf(p.value)))
		}
		return json.RawMessage("{" + strings.Join(parts, ",") + "}")
	case []any:
		var parts []string
		for _, v := range x {
			parts = append(parts, string(jsonOf(v)))
		}
		return json.RawMessage("[" + strings.Join(parts, ",") + "]")
	}
	text, err := json.Marshal(tree)
	if err != nil {
		panic(err)
	}
	return text
}

// FuzzEditText looks for texts and values that are changed wrongly: EditText compares what it wrote
// with what was asked, so a text that comes back is right unless it panics.
func FuzzEditText(f *testing.F) {
	f.Add(written, "sites|0|at", `"47.5 N, 20.1 W"`)
	f.Add("a: {b: [1, 2]}", "a|b|0", `{"c": null}`)
	f.Add("- a\n- b\n", "1", `3`)
	f.Fuzz(func(t *testing.T, text, at, value string) {
		for _, do := range []string{SetKey, AddEntry, RemoveKey} {
			got, err := EditText([]byte(text), Edit{do, path(at), json.RawMessage(value)})
			if (err == nil) == (got == nil) {
				t.Fatalf("%s %q: text %q and error %v", do, at, got, err)
			}
		}
	})
}

// TestWindowsLines checks that problems of a plan with carriage returns have their true lines.
func TestWindowsLines(t *testing.T) {
	text := strings.ReplaceAll("# a\n# b\nformat: 1 # c\n\ntitle: 3\n", "\n", "\r\n")
	_, err := Parse("made.yaml", []byte(text))
	if err == nil || !strings.Contains(err.Error(), "made.yaml:5:8: title") {
		t.Errorf("the title stands in line 5, not: %v", err)
	}
}
