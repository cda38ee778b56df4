package web

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"net"
	"net/http"
	"net/http/httptest"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"testing/fstest"
	"time"

	"github.com/danielgtaylor/huma/v2"
)

// TestHost: a page whose name has been pointed at this machine gets nothing.
func TestHost(t *testing.T) {
	s := serve(t, demo(t))
	for host, want := range map[string]int{
		"127.0.0.1:8760": 200, "localhost:8760": 200, "LOCALHOST": 200, "[::1]:8760": 200, "127.0.0.1": 200, "192.168.3.4:80": 200,
		"example.org": 421, "example.org:8760": 421, "localhost.example.org": 421, "127.0.0.1.example.org:8760": 421, "": 421,
	} {
		for _, target := range []string{"/", "/api/plan", "/tiles/ground/x/0/0/0.png", "/nothing"} {
			a := ask(s, http.MethodGet, target, "", "Host", host)
			if (a.status == 421) != (want == 421) {
				t.Errorf("host %q, %s: status %d, want %d", host, target, a.status, want)
			}
		}
	}
	refused(t, ask(s, http.MethodGet, "/", "", "Host", "example.org"), 421, "localhost")
}

// TestOrigin: pages of other origins may not write; this server's own page and programs may.
func TestOrigin(t *testing.T) {
	s := serve(t, demo(t))
	for _, tc := range []struct {
		headers []string
		foreign bool
	}{
		{nil, false},
		{[]string{"Origin", "http://127.0.0.1:8760"}, false},
		{[]string{"Sec-Fetch-Site", "same-origin"}, false},
		{[]string{"Origin", "http://127.0.0.1:9999"}, true},
		{[]string{"Origin", "http://example.org"}, true},
		{[]string{"Origin", "null"}, true},
		{[]string{"Sec-Fetch-Site", "cross-site"}, true},
		{[]string{"Sec-Fetch-Site", "same-site"}, true},
	} {
		for _, call := range [][2]string{{http.MethodPost, "/api/try"}, {http.MethodPost, "/api/plan/check"}, {http.MethodPut, "/api/plan"}, {http.MethodPost, "/"}} {
			if a := ask(s, call[0], call[1], "{", tc.headers...); (a.status == http.StatusForbidden) != tc.foreign {
				t.Errorf("%v, %v: status %d", tc.headers, call, a.status)
			}
		}
	}
}

func TestHeaders(t *testing.T) {
	s := serve(t, demo(t))
	for _, target := range []string{"/", "/assets/main-1.mjs", "/api/plan", "/nothing", "/api/links?version=0"} {
		h := ask(s, http.MethodGet, target, "").header
		csp := h.Get("Content-Security-Policy")
		if !strings.Contains(csp, "default-src 'none'") || strings.Contains(csp, "unsafe") || h.Get("X-Content-Type-Options") != "nosniff" || h.Get("Referrer-Policy") != "no-referrer" {
			t.Errorf("%s: %v", target, h)
		}
		for name := range h {
			if strings.HasPrefix(name, "Access-Control") {
				t.Errorf("%s lets other origins read: %s", target, name)
			}
		}
	}
}

func TestPage(t *testing.T) {
	s := serve(t, demo(t))
	for _, tc := range []struct{ target, kind, cache string }{
		{"/", "text/html; charset=utf-8", "no-cache"},
		{"/index.html", "text/html; charset=utf-8", "no-cache"},
		{"/assets/main-1.mjs", "text/javascript; charset=utf-8", "max-age=31536000, immutable"},
	} {
		a := ask(s, http.MethodGet, tc.target, "")
		if a.status != 200 || a.header.Get("Content-Type") != tc.kind || a.header.Get("Cache-Control") != tc.cache {
			t.Errorf("%s: status %d, %v", tc.target, a.status, a.header)
		}
		if head := ask(s, http.MethodHead, tc.target, ""); head.status != 200 {
			t.Errorf("HEAD %s: status %d", tc.target, head.status)
		}
	}
	for _, target := range []string{"/assets", "/assets/", "/none", "/../server.go", "/%2e%2e/server.go", "/..%2fserver.go", "/etc/passwd", "//etc/passwd", "/api", "/api/none", "/api/layers/none"} {
		refused(t, ask(s, http.MethodGet, target, ""), http.StatusNotFound, "/api/openapi.json")
	}
	refused(t, ask(s, http.MethodDelete, "/api/plan", ""), http.StatusMethodNotAllowed, "")
}

// TestNoPage: the program builds without the page, and then says what is missing; the API works.
func TestNoPage(t *testing.T) {
	s, err := New(Options{Plan: demo(t), Page: fstest.MapFS{".keep": {}}, Log: io.Discard})
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	refused(t, ask(s, http.MethodGet, "/", ""), http.StatusServiceUnavailable, "make app")
	refused(t, ask(s, http.MethodGet, "/favicon.ico", ""), http.StatusNotFound, "")
	get[PlanAnswer](t, s, "/api/plan")
	if _, err := Page().Open(".keep"); err != nil {
		t.Errorf("the embedded folder: %v", err)
	}
}

// TestMalformed sends what is no request of the API.
func TestMalformed(t *testing.T) {
	s := serve(t, demo(t))
	for _, tc := range []struct {
		method, target, body string
		status               int
		holds                string
	}{
		{http.MethodPut, "/api/plan", "{", 400, "body"},
		{http.MethodPut, "/api/plan", "", 400, "body"},
		{http.MethodPut, "/api/plan", "\x00\xff", 400, "body"},
		{http.MethodPut, "/api/plan", "[]", 422, "body"},
		{http.MethodPut, "/api/plan", `{"read":"x"}`, 422, "text"},
		{http.MethodPut, "/api/plan", `{"read":"x","text":7}`, 422, "body.text"},
		{http.MethodPut, "/api/plan", `{"read":"x","text":"","more":1}`, 422, "body.more"},
		{http.MethodPost, "/api/try", `{"edits":[{"do":"move","path":["a"]}]}`, 422, "body.edits[0].do"},
		{http.MethodPost, "/api/try", `{"edits":[{"do":"set","path":[]}]}`, 422, "body.edits[0].path"},
		{http.MethodPost, "/api/try", `{"edits":null}`, 422, "body.edits"},
		{http.MethodPost, "/api/try", `{"edits":[{"do":"set","path":["title"]}]}`, 422, "missing"},
		{http.MethodPost, "/api/try", strings.Repeat("[", 100000), 400, "body"},
		{http.MethodPost, "/api/try", `{"edits":[` + strings.Repeat(`{"do":"remove","path":["title"]},`, 1000) + `{"do":"remove","path":["title"]}]}`, 422, "1000"},
		{http.MethodGet, "/api/links?sort=up", "", 422, "sort"},
		{http.MethodGet, "/api/heights?station=Gauge+3&from_m=high&to_m=4&step_m=1&antennas=rod", "", 422, "from_m"},
		{http.MethodGet, "/api/heights?station=Gauge+3&from_m=4&to_m=1e9&step_m=1&antennas=rod", "", 422, "to_m"},
		{http.MethodGet, "/api/heights?station=Gauge+3&from_m=NaN&to_m=4&step_m=1&antennas=rod", "", 422, ""},
		{http.MethodGet, "/api/place?lat=91&lon=0", "", 422, "lat"},
		{http.MethodGet, "/api/files/links.pdf", "", 422, "format"},
	} {
		a := ask(s, tc.method, tc.target, tc.body)
		if a.status != tc.status {
			t.Errorf("%s %s %.60q: status %d, want %d: %.300s", tc.method, tc.target, tc.body, a.status, tc.status, a.body)
			continue
		}
		refused(t, a, tc.status, tc.holds)
	}
}

// TestBodyLimit: a body that is too large is refused before it is read to its end.
func TestBodyLimit(t *testing.T) {
	s := serve(t, demo(t))
	a := ask(s, http.MethodPost, "/api/plan/check", `{"text":"`+strings.Repeat("x", maxBodyBytes)+`"}`)
	refused(t, a, http.StatusRequestEntityTooLarge, "too large")
	refused(t, ask(s, http.MethodPost, "/api/plan/check", `{"text":"`+strings.Repeat("x", maxPlanBytes+1)+`"}`), http.StatusUnprocessableEntity, "1048576")
}

// TestPanic: whatever goes wrong inside, the server answers, tells its log, and goes on.
func TestPanic(t *testing.T) {
	var log bytes.Buffer
	s, err := New(Options{Plan: demo(t), Page: fstest.MapFS{}, Log: &log})
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	h := s.recovered(http.HandlerFunc(func(http.ResponseWriter, *http.Request) { panic("made to") }))
	refused(t, ask(h, http.MethodGet, "/api/plan", ""), http.StatusInternalServerError, "standard error")
	if !strings.Contains(log.String(), "made to") {
		t.Errorf("the log holds %q", log.String())
	}
}

// TestServe asks over a socket, and stops the server while a job runs and is watched.
func TestServe(t *testing.T) {
	path := demo(t)
	write(t, path, coverText(t, "40 km", "30 m"))
	s := serve(t, path)
	on, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	ctx, stop := context.WithCancel(t.Context())
	ended := make(chan error, 1)
	go func() { ended <- s.Serve(ctx, on) }()
	response, err := http.Get(fmt.Sprintf("http://%s/api/plan", on.Addr()))
	if err != nil {
		t.Fatal(err)
	}
	response.Body.Close()
	if response.StatusCode != 200 {
		t.Errorf("status %d", response.StatusCode)
	}
	events, err := http.Get(fmt.Sprintf("http://%s/api/coverage/%s/events", on.Addr(), start(t, s).ID))
	if err != nil {
		t.Fatal(err)
	}
	defer events.Body.Close()
	stop()
	select {
	case err := <-ended:
		if err != nil {
			t.Errorf("the server ended with %v", err)
		}
	case <-time.After(30 * time.Second):
		t.Fatal("the server does not end")
	}
	if _, err := net.Dial("tcp", on.Addr().String()); err == nil {
		t.Error("the port is still open")
	}
}

// TestBrokenPlanAtStart: a plan that is wrong, or not there, is the error of the commands.
func TestBrokenPlanAtStart(t *testing.T) {
	path := demo(t)
	write(t, path, "format: 2\n")
	if _, err := New(Options{Plan: path, Page: fstest.MapFS{}, Log: io.Discard}); err == nil || !strings.Contains(err.Error(), "hallin.yaml:1:9") {
		t.Errorf("a broken plan: %v", err)
	}
	if _, err := New(Options{Plan: path + ".none", Page: fstest.MapFS{}, Log: io.Discard}); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("no plan: %v", err)
	}
	write(t, path, strings.Repeat("#\n", maxPlanBytes))
	if _, err := New(Options{Plan: path, Page: fstest.MapFS{}, Log: io.Discard}); err == nil || !strings.Contains(err.Error(), "it is no plan") {
		t.Errorf("a large plan: %v", err)
	}
}

// TestNoPathOfAClient walks all parameters of the API that take a text and names a file there: it is
// never opened, which a pipe that nobody writes to would show by standing still.
func TestNoPathOfAClient(t *testing.T) {
	s := serve(t, demo(t))
	secret := filepath.Join(t.TempDir(), "secret.csv")
	write(t, secret, "a word that must not come back")
	done := make(chan struct{})
	go func() {
		defer close(done)
		for path, item := range s.api.Paths {
			op := item.Get
			if op == nil {
				continue
			}
			for _, p := range op.Parameters {
				if p.Schema.Type == huma.TypeString && p.In == "query" {
					a := ask(s, http.MethodGet, strings.ReplaceAll(path, "{format}", "txt")+"?"+p.Name+"="+secret, "")
					if bytes.Contains(a.body, []byte("must not come back")) {
						t.Errorf("%s %s opens a file", path, p.Name)
					}
				}
			}
		}
	}()
	select {
	case <-done:
	case <-time.After(time.Minute):
		t.Fatal("a request stands still")
	}
}

// TestAtOnce asks many things at once of versions that come and go; run with the race detector.
func TestAtOnce(t *testing.T) {
	s := serve(t, demo(t))
	server := httptest.NewServer(s)
	defer server.Close()
	ended := make(chan error)
	const clients = 8
	for i := range clients {
		go func() {
			for j := range 4 {
				body := fmt.Sprintf(`{"link":"Gauge 3..Mouth Hill","edits":[{"do":"set","path":["sites","Gauge 3","antenna","above_ground"],"value":"%d.%d m"}]}`, 4+i%4, j)
				a := ask(s, http.MethodPost, "/api/try", body)
				ask(s, http.MethodGet, "/api/plan", "")
				ask(s, http.MethodGet, "/api/layers/sites", "")
				if a.status != 200 {
					ended <- fmt.Errorf("status %d: %s", a.status, a.body)
					return
				}
			}
			ended <- nil
		}()
	}
	for range clients {
		if err := <-ended; err != nil {
			t.Error(err)
		}
	}
}

// TestBounded holds as many requests as may be worked on; one more, on another address, waits for them.
func TestBounded(t *testing.T) {
	bound := bounded()
	entered, leave := make(chan struct{}, maxAtOnce), make(chan struct{})
	slow := bound(http.HandlerFunc(func(http.ResponseWriter, *http.Request) { entered <- struct{}{}; <-leave }))
	reached := make(chan string, 2)
	other := bound(http.HandlerFunc(func(_ http.ResponseWriter, r *http.Request) { reached <- r.URL.Path }))
	for range maxAtOnce {
		go ask(slow, http.MethodGet, "/api/slow", "")
	}
	for range maxAtOnce {
		<-entered
	}
	go ask(other, http.MethodGet, "/api/other", "")
	ask(other, http.MethodGet, "/api/coverage/1/events", "")
	if first := <-reached; first != "/api/coverage/1/events" {
		t.Errorf("%s is reached while %d requests are worked on", first, maxAtOnce)
	}
	close(leave)
	if second := <-reached; second != "/api/other" {
		t.Errorf("%s is reached", second)
	}
}
