package main

import (
	"encoding/json"
	"errors"
	"os"
	"os/exec"
	"slices"
	"strconv"
	"strings"

	"github.com/rogpeppe/go-internal/testscript"
)

func scriptCommands() map[string]func(ts *testscript.TestScript, neg bool, args []string) {
	return map[string]func(ts *testscript.TestScript, neg bool, args []string){
		"exit": scriptExit, "justfiles": scriptJustFiles, "json": scriptJSON,
	}
}

// scriptExit runs a program that must end with the status named first.
func scriptExit(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: exit STATUS PROGRAM [ARGUMENT…]")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	got := 0
	if err := ts.Exec(args[1], args[2:]...); err != nil {
		var e *exec.ExitError
		if !errors.As(err, &e) {
			ts.Fatalf("%v", err)
		}
		got = e.ExitCode()
	}
	if got != want {
		ts.Fatalf("exit status %d, want %d", got, want)
	}
}

// scriptJustFiles checks that the script's folder, or the one named first with
// a slash at its end, holds exactly the files named.
func scriptJustFiles(ts *testscript.TestScript, neg bool, args []string) {
	dir := "."
	if len(args) > 0 && strings.HasSuffix(args[0], "/") {
		dir, args = args[0], args[1:]
	}
	entries, err := os.ReadDir(ts.MkAbs(dir))
	ts.Check(err)
	var got []string
	for _, e := range entries {
		if dir != "." || !strings.HasPrefix(e.Name(), ".tmp") { // the script's own folder for temporary files
			got = append(got, e.Name())
		}
	}
	want := slices.Sorted(slices.Values(args))
	if same := slices.Equal(got, want); same == neg {
		ts.Fatalf("%s holds %q, the script says %q", dir, got, want)
	}
}

// scriptJSON checks that a file (or stdout, stderr) is one JSON value.
func scriptJSON(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 1 {
		ts.Fatalf("usage: json FILE")
	}
	if !json.Valid([]byte(ts.ReadFile(args[0]))) {
		ts.Fatalf("%s is not JSON", args[0])
	}
}
