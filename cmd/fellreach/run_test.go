package main

import (
	"bytes"
	"context"
	"encoding/json"
	"flag"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
)

var update = flag.Bool("update", false, "write the golden files anew")

// asProgram makes the test binary behave as the program itself, in a process of its own.
const asProgram = "FELLREACH_TEST_AS_PROGRAM"

func TestMain(m *testing.M) {
	if os.Getenv(asProgram) != "" {
		main()
	}
	flag.Parse()
	status := m.Run()
	if demoFolder != "" {
		os.RemoveAll(filepath.Dir(demoFolder))
	}
	os.Exit(status)
}

// An answer is what a command line left behind.
type answer struct {
	status   int
	out, err string
}

// fellreach runs a command line in this process.
func fellreach(args ...string) answer { return fellreachWithin(context.Background(), args...) }

func fellreachWithin(ctx context.Context, args ...string) answer {
	var out, err bytes.Buffer
	status := run(ctx, args, &out, &err)
	return answer{status, out.String(), err.String()}
}

// program runs a command line in a process of its own, so that all that C libraries print shows.
func program(t *testing.T, args ...string) answer {
	t.Helper()
	var out, err bytes.Buffer
	cmd := exec.Command(os.Args[0], args...)
	cmd.Env = append(os.Environ(), asProgram+"=1")
	cmd.Stdout, cmd.Stderr = &out, &err
	if e := cmd.Run(); e != nil && cmd.ProcessState == nil {
		t.Fatal(e)
	}
	return answer{cmd.ProcessState.ExitCode(), out.String(), err.String()}
}

// succeeds runs a command line that must end with a status and without a word of error, and
// returns what it printed.
func succeeds(t *testing.T, status int, args ...string) string {
	t.Helper()
	a := fellreach(args...)
	if a.status != status || strings.Contains(a.err, "error") {
		t.Fatalf("fellreach %q: status %d, want %d; standard error:\n%s", args, a.status, status, a.err)
	}
	return a.out
}

// decoded reads JSON that a command printed.
func decoded[T any](t *testing.T, text string) T {
	t.Helper()
	var value T
	if err := json.Unmarshal([]byte(text), &value); err != nil {
		t.Fatalf("%v in:\n%.500s", err, text)
	}
	return value
}

// demoFolder is the demo's folder once [demo] has made it.
var demoFolder string

// makeDemo runs the demo command, once for all tests.
var makeDemo = sync.OnceValues(func() (answer, error) {
	parent, err := os.MkdirTemp("", "fellreach-demo-*")
	if err != nil {
		return answer{}, err
	}
	demoFolder = filepath.Join(parent, "made", "hallin")
	return fellreach("demo", demoFolder), nil
})

// demo returns the demo's plan.
func demo(t *testing.T) string {
	t.Helper()
	a, err := makeDemo()
	if err == nil && a.status != exitDone {
		err = fmt.Errorf("status %d: %s", a.status, a.err)
	}
	if err != nil {
		t.Fatalf("making the demo: %v", err)
	}
	return filepath.Join(demoFolder, "hallin.yaml")
}

// testdata is the path of a file of the repository's testdata.
func testdata(parts ...string) string {
	return filepath.Join(append([]string{"..", "..", "testdata"}, parts...)...)
}

// golden compares a text with a file of testdata/golden, or writes it with -update. The file holds
// what the program printed: a regression check.
func golden(t *testing.T, name, got string) {
	t.Helper()
	path := testdata("golden", name)
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if got != string(want) {
		t.Errorf("%s differs (make generate writes it anew); got:\n%s\nwant:\n%s", path, got, want)
	}
}

// write puts a file into a folder.
func write(t *testing.T, folder, name, text string) string {
	t.Helper()
	path := filepath.Join(folder, name)
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}
