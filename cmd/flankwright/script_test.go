package main

import (
	"flag"
	"os"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

// update makes the scripts take what the program prints as their golden files:
// go test ./cmd/flankwright -run TestScripts -update
var update = flag.Bool("update", false, "refresh the golden files of the scripts")

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){
		"flankwright": func() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) },
	})
}

// TestScripts runs testdata/script, which reads like a terminal. Beside the
// usual commands there are:
//
//	exit N PROGRAM…  the program ends with exactly that status
//	justfiles NAME…  the folder holds these files and no other (hidden ones too)
//	json FILE        the file is one JSON value with nothing behind it
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 "testdata/script",
		UpdateScripts:       *update,
		RequireExplicitExec: true,
		RequireUniqueNames:  true,
		Cmds:                scriptCommands(),
		Setup: func(env *testscript.Env) error {
			env.Setenv("GORACE", "atexit_sleep_ms=0") // else every program of a -race run waits a second
			return nil
		},
	})
}
