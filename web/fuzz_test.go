package web

import (
	"net/http"
	"net/url"
	"testing"
)

// FuzzBodies sends bodies of any kind to the calls that take one: each answer is one that the API knows,
// never a failure inside.
func FuzzBodies(f *testing.F) {
	s := serve(f, demo(f))
	for _, body := range []string{
		`{"edits":[{"do":"set","path":["sites","West head","at"],"value":"47.5 N, 20.2 W"}],"link":"trunk"}`,
		`{"edits":[{"do":"add","path":["links"],"value":{"from":"Gauge 1","to":"Mouth Hill","channel":"poll"}}]}`,
		`{"edits":[{"do":"remove","path":["sites","0"]}],"version":"0123"}`,
		`{"text":"format: 1\n"}`, `{"read":"x","text":"a: [1, 2"}`, `{"site":"Hallin Top/gauges"}`, `{"edits":[]}`, `[`, `{"edits":[{"do":"set","path":["\u0000"],"value":1e400}]}`,
	} {
		f.Add(body)
	}
	f.Fuzz(func(t *testing.T, body string) {
		for _, call := range [][2]string{{http.MethodPost, "/api/try"}, {http.MethodPost, "/api/plan/check"}, {http.MethodPut, "/api/plan"}} {
			if a := ask(s, call[0], call[1], body); !answers[a.status] {
				t.Fatalf("%v %q: status %d: %s", call, body, a.status, a.body)
			}
		}
	})
}

// FuzzQueries does the same with queries.
func FuzzQueries(f *testing.F) {
	s := serve(f, demo(f))
	f.Add("/api/section", "link", "West head..Ormvik/coast")
	f.Add("/api/place", "at", "UTM 27N 591350 5250250")
	f.Add("/api/place", "lon", "1e300")
	f.Add("/api/links", "version", "..")
	f.Add("/api/antenna", "station", "Gauge 3")
	f.Add("/api/heights", "station", "Gauge 3")
	f.Add("/tiles/ground/0/0/0/0.png", "", "")
	f.Fuzz(func(t *testing.T, path, key, value string) {
		target := url.URL{Path: "/" + path, RawQuery: url.Values{key: {value}}.Encode()}
		if a := ask(s, http.MethodGet, target.String(), ""); !answers[a.status] {
			t.Fatalf("%s: status %d: %s", target.String(), a.status, a.body)
		}
	})
}

// answers are the statuses that the API gives to whatever it is sent.
var answers = map[int]bool{
	http.StatusOK: true, http.StatusBadRequest: true, http.StatusNotFound: true, http.StatusMethodNotAllowed: true, http.StatusConflict: true,
	http.StatusRequestEntityTooLarge: true, http.StatusUnprocessableEntity: true, http.StatusTooManyRequests: true,
}
