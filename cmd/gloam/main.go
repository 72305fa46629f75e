// Command gloam plans the celestial sights of a voyage.
package main

import (
	"fmt"
	"io"
	"os"
	"time"
	_ "time/tzdata" // names of zones for --ship-time, on any machine

	"github.com/spf13/cobra"

	"gloam/plan"
)

// Exit codes.
const (
	exitDone   = 0
	exitFailed = 1
	exitUsage  = 2
)

func main() {
	os.Exit(run(os.Args[1:], world{os.Stdin, os.Stdout, os.Stderr, os.Getenv, time.Now}))
}

// world is what a command touches outside the program, files aside.
type world struct {
	in       io.Reader
	out, err io.Writer
	env      func(string) string
	now      func() time.Time
}

// run carries out one command line and gives its exit code.
func run(args []string, w world) int {
	root := newRoot(w)
	root.SetArgs(args)
	err := root.Execute()
	if err != nil {
		report(w.err, err)
	}
	return exitCode(err)
}

func newRoot(w world) *cobra.Command {
	root := &cobra.Command{
		Use:           "gloam",
		Short:         "Plan the celestial sights of a voyage",
		Long:          "gloam plans the celestial sights of a voyage: twilight at the moving ship, the\nbodies to shoot, the triads that cross well, what to set on the sextant, and a\ncalendar for the phone.",
		Version:       plan.Version,
		SilenceUsage:  true,
		SilenceErrors: true,
		Args: func(_ *cobra.Command, args []string) error {
			if len(args) > 0 {
				return usage(fmt.Errorf("unknown command %q", args[0]))
			}
			return nil
		},
		RunE: func(cmd *cobra.Command, _ []string) error { return cmd.Help() },
	}
	root.SetIn(w.in)
	root.SetOut(w.out)
	root.SetErr(w.err)
	root.SetFlagErrorFunc(func(_ *cobra.Command, err error) error { return usage(err) })
	root.AddCommand(newPlan(w), newRoute(w), newSky(w), newAlmanac(w))
	return root
}
