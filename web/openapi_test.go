package web

import (
	"encoding/json"
	"net/http"
	"net/url"
	"os"
	"slices"
	"strings"
	"testing"

	"github.com/danielgtaylor/huma/v2"
)

// TestOpenAPI compares the API's description with the file that the page's types are made from.
func TestOpenAPI(t *testing.T) {
	got, err := serve(t, demo(t)).api.YAML()
	if err != nil {
		t.Fatal(err)
	}
	if *update {
		write(t, "openapi.yaml", string(got))
	}
	want, err := os.ReadFile("openapi.yaml")
	if err != nil {
		t.Fatal(err)
	}
	if string(got) != string(want) {
		t.Error("openapi.yaml differs from the API: make generate writes it anew")
	}
}

// TestExamples runs every operation with the examples of its description; each must succeed. The number
// of a job and the version of the file are those that there are.
func TestExamples(t *testing.T) {
	for path, item := range serve(t, demo(t)).api.Paths {
		for method, op := range map[string]*huma.Operation{http.MethodGet: item.Get, http.MethodPut: item.Put, http.MethodPost: item.Post, http.MethodDelete: item.Delete} {
			if op == nil {
				continue
			}
			t.Run(op.OperationID, func(t *testing.T) {
				s := serve(t, smallCover(t))
				target := exampleTarget(t, path, op)
				if strings.Contains(path, "{id}") {
					target = strings.Replace(target, "0011223344556677", exampleJob(t, s, method), 1)
				}
				a := ask(s, method, target, exampleBody(t, s, op))
				if a.status/100 != 2 {
					t.Errorf("status %d: %.800s", a.status, a.body)
				}
				if want := "application/json"; len(op.Responses["200"].Content) == 1 && op.Responses["200"].Content[want] != nil && a.header.Get("Content-Type") != want {
					t.Errorf("content type %q, want %q", a.header.Get("Content-Type"), want)
				}
			})
		}
	}
}

// exampleTarget fills in the parameters that have examples; all that are required must.
func exampleTarget(t *testing.T, path string, op *huma.Operation) string {
	query := url.Values{}
	for _, p := range op.Parameters {
		if p.Schema == nil || len(p.Schema.Examples) == 0 {
			if p.Required {
				t.Errorf("%s %s has no example", op.OperationID, p.Name)
			}
			continue
		}
		text, isText := p.Schema.Examples[0].(string)
		if !isText {
			number, err := json.Marshal(p.Schema.Examples[0])
			if err != nil {
				t.Fatal(err)
			}
			text = strings.NewReplacer("[", "", "]", "", `"`, "").Replace(string(number)) // lists have commas between
		}
		if p.In == "path" {
			path = strings.ReplaceAll(path, "{"+p.Name+"}", url.PathEscape(text))
		} else {
			query.Set(p.Name, text)
		}
	}
	return path + "?" + query.Encode()
}

// exampleJob starts a coverage job, and waits for its end unless it is to be cancelled.
func exampleJob(t *testing.T, s *Server, method string) string {
	job := send[CoverJob](t, s, http.StatusOK, http.MethodPost, "/api/coverage", CoverBody{Site: "Hallin Top/gauges"})
	if method != http.MethodDelete {
		ended(t, s, job.ID)
	}
	return job.ID
}

// exampleBody is the example of a body, its version of the file the one the file has.
func exampleBody(t *testing.T, s *Server, op *huma.Operation) string {
	if op.RequestBody == nil {
		return ""
	}
	example := op.RequestBody.Content["application/json"].Example
	if example == nil {
		t.Fatalf("%s has no example of its body", op.OperationID)
	}
	if body, ok := example.(SaveBody); ok {
		body.Read = s.shelf.file.id
		example = body
	}
	text, err := json.Marshal(example)
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// TestDescription checks what makes a description usable: names, summaries, problems, no unnamed
// schemas.
func TestDescription(t *testing.T) {
	doc := get[map[string]any](t, serve(t, demo(t)), "/api/openapi.json")
	if doc["openapi"] != "3.1.0" {
		t.Errorf("openapi is %v, want 3.1.0", doc["openapi"])
	}
	schemas := doc["components"].(map[string]any)["schemas"].(map[string]any)
	for _, name := range []string{"Links", "Link", "Direction", "Line", "Section", "Problem"} {
		if schemas[name] == nil {
			t.Errorf("there is no schema %s", name)
		}
	}
	for _, name := range []string{"ErrorModel", "ErrorDetail"} {
		if schemas[name] != nil {
			t.Errorf("schema %s is left over", name)
		}
	}
	links := schemas["Links"].(map[string]any)["properties"].(map[string]any)["links"].(map[string]any)
	if links["type"] != "array" {
		t.Errorf("links is of type %v, want array alone", links["type"])
	}
	verdict := schemas["Link"].(map[string]any)["properties"].(map[string]any)["verdict"].(map[string]any)
	if got := verdict["enum"].([]any); !slices.Equal(got, []any{"closes", "thin", "fails"}) {
		t.Errorf("verdicts are %v", got)
	}
}
