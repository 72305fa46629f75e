package main

import (
	"flag"
	"os"
	"path/filepath"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

var update = flag.Bool("update", false, "renew the expected output of scripts and examples")

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"gloam": main})
}

// TestScripts runs the sessions in testdata, each in a folder of its own with
// a route (route.geojson) that needs no flags.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 "testdata",
		RequireExplicitExec: true,
		UpdateScripts:       *update,
		Setup: func(env *testscript.Env) error {
			env.Setenv("SOURCE_DATE_EPOCH", "1790000000")
			route, err := os.ReadFile(filepath.Join("testdata", "route.geojson"))
			if err != nil {
				return err
			}
			return os.WriteFile(filepath.Join(env.WorkDir, "route.geojson"), route, 0o644)
		},
	})
}
