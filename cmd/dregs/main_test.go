package main

import (
	"os"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"dregs": func() { os.Exit(run()) }})
}

// TestScripts runs the verbs as a user does. The expected screens are in the
// scripts; DREGS_UPDATE=1 writes them anew, to be read before they are kept.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 "testdata/script",
		UpdateScripts:       os.Getenv("DREGS_UPDATE") != "",
		RequireExplicitExec: true,
		RequireUniqueNames:  true,
		Cmds:                map[string]func(*testscript.TestScript, bool, []string){"exits": exits},
		Setup: func(e *testscript.Env) error {
			e.Setenv("SOURCE_DATE_EPOCH", "1798761600") // 1 January 2027
			return os.CopyFS(e.WorkDir, os.DirFS("testdata/recipes"))
		},
	})
}

// exits runs a command and compares its exit code: exits 1 dregs check ...
func exits(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: exits CODE COMMAND...")
	}
	err := ts.Exec(args[1], args[2:]...)
	code := "0"
	if err != nil {
		code = exitCode(err)
	}
	if code != args[0] {
		ts.Fatalf("exit code %s, want %s (%v)", code, args[0], err)
	}
}

func exitCode(err error) string {
	type coded interface{ ExitCode() int }
	if c, ok := err.(coded); ok {
		return string(rune('0' + c.ExitCode()))
	}
	return err.Error()
}
