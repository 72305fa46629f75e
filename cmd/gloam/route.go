package main

import (
	"bytes"
	"errors"
	"fmt"

	"github.com/spf13/cobra"

	"gloam/plan"
	"gloam/track"
)

// routeFlags are what the command line says of a route to be told or written.
type routeFlags struct {
	settingsFlags
	voyageFlags
	to, out string
}

func newRoute(w world) *cobra.Command {
	f := &routeFlags{}
	cmd := &cobra.Command{
		Use:   "route ROUTE",
		Short: "Tell what was understood of a route, or write it for a map or plotter",
		Long: "Reads a route and tells its legs with course, distance, speed and times, the\n" +
			"stays, the ship's clock and the date line. With --to it writes the route, the\n" +
			"hourly DR positions and the windows as points, for any map or plotter.",
		Example: "  gloam route route.geojson --depart 2026-11-20T12:00Z --speed 6.5\n" +
			"  gloam route route.geojson --to gpx > voyage.gpx",
		Args:              func(cmd *cobra.Command, args []string) error { return usage(cobra.ExactArgs(1)(cmd, args)) },
		RunE:              func(_ *cobra.Command, args []string) error { return f.run(args[0], w) },
		ValidArgsFunction: routeFiles,
	}
	flags := cmd.Flags()
	flags.SortFlags = false
	f.voyageFlags.define(cmd)
	flags.StringVar(&f.to, "to", "", "write as geojson or gpx")
	flags.StringVar(&f.out, "out", "-", "file to write to; - for standard output")
	f.settingsFlags.define(cmd)
	_ = cmd.RegisterFlagCompletionFunc("to", cobra.FixedCompletions([]string{"geojson", "gpx"}, cobra.ShellCompDirectiveNoFileComp))
	return cmd
}

func (f *routeFlags) run(file string, w world) error {
	if f.to != "" && f.to != "geojson" && f.to != "gpx" {
		return usage(fmt.Errorf("--to %q (geojson or gpx)", f.to))
	}
	if sameFile(f.out, file) {
		return usage(errors.New("--out names the route file, which would be lost"))
	}
	r, err := readRoute(file, w.in)
	if err != nil {
		return err
	}
	p, rule, err := f.sail(file, r)
	if err != nil {
		return err
	}
	var b bytes.Buffer
	if f.to == "" {
		err = plan.WriteRoute(&b, p, track.NewClock(p, rule), r.Notes, bold(w))
	} else {
		err = f.write(&b, p, r.EyeM)
	}
	if err != nil {
		return err
	}
	return writeAll([]output{{f.out, &b}}, w.out)
}

// write writes the passage with its hourly DR positions and windows.
func (f *routeFlags) write(b *bytes.Buffer, p *track.Passage, eyeM float64) error {
	set, err := f.settings(eyeM)
	if err != nil {
		return err
	}
	set.Kinds = []plan.ItemKind{plan.Stars}
	pl, err := plan.New(p, set)
	if err != nil {
		return settingError(err)
	}
	marks := append(p.HourlyMarks(), pl.Marks()...)
	if f.to == "gpx" {
		return track.WriteGPX(b, p, marks)
	}
	return track.WriteGeoJSON(b, p, marks)
}
