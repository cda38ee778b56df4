package main

import (
	"bufio"
	"encoding/json"
	"io"
	"net"
	"net/http"
	"os"
	"os/exec"
	"strings"
	"testing"
	"time"
)

// TestServe starts the program as a person does: the first line is the address, the API answers what
// the command prints, and an interrupt ends it well.
func TestServe(t *testing.T) {
	cmd := exec.Command(os.Args[0], "serve", demo(t), "--listen", "127.0.0.1:0")
	cmd.Env = append(os.Environ(), asProgram+"=1")
	out, err := cmd.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	var stderr strings.Builder
	cmd.Stderr = &stderr
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	defer cmd.Process.Kill()
	lines := bufio.NewReader(out)
	address, err := lines.ReadString('\n')
	if err != nil || !strings.HasPrefix(address, "http://127.0.0.1:") || !strings.HasSuffix(address, "/\n") {
		t.Fatalf("the first line is %q, %v; standard error: %s", address, err, stderr.String())
	}
	response, err := http.Get(strings.TrimSpace(address) + "api/links")
	if err != nil {
		t.Fatal(err)
	}
	defer response.Body.Close()
	body, err := io.ReadAll(response.Body)
	if err != nil {
		t.Fatal(err)
	}
	var got, want any
	if json.Unmarshal(body, &got) != nil || json.Unmarshal([]byte(succeeds(t, exitLinks, "links", demo(t), "--format", "json")), &want) != nil {
		t.Fatalf("no JSON: %.200s", body)
	}
	a, _ := json.Marshal(got)
	b, _ := json.Marshal(want)
	if string(a) != string(b) {
		t.Error("GET /api/links differs from links --format json")
	}
	if err := cmd.Process.Signal(os.Interrupt); err != nil {
		t.Fatal(err)
	}
	ended := make(chan error, 1)
	go func() {
		rest, _ := io.ReadAll(lines)
		if len(rest) > 0 {
			t.Errorf("more on standard output: %q", rest)
		}
		ended <- cmd.Wait()
	}()
	select {
	case err := <-ended:
		if err != nil || stderr.Len() > 0 {
			t.Errorf("ended with %v; standard error: %s", err, stderr.String())
		}
	case <-time.After(time.Minute):
		t.Fatal("an interrupt does not end it")
	}
}

func TestServeMistakes(t *testing.T) {
	taken, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	defer taken.Close()
	for _, tc := range []struct {
		args   []string
		status int
		says   string
	}{
		{[]string{"serve", demo(t), "--listen", taken.Addr().String()}, exitOther, "in use"},
		{[]string{"serve", demo(t), "--listen", "here"}, exitOther, "--listen 127.0.0.1:8760"},
		{[]string{"serve", demo(t), "--listen", "127.0.0.1:99999"}, exitOther, "port"},
		{[]string{"serve"}, exitUsage, "one plan file"},
		{[]string{"serve", "none.yaml"}, exitOther, "none.yaml"},
		{[]string{"serve", write(t, t.TempDir(), "bad.yaml", "format: 2\n"), "--listen", "127.0.0.1:0"}, exitUsage, "bad.yaml:1:9"},
	} {
		if a := fellreach(tc.args...); a.status != tc.status || !strings.Contains(a.err, tc.says) || a.out != "" {
			t.Errorf("%q: status %d, want %d; %s", tc.args, a.status, tc.status, a.err)
		}
	}
}
