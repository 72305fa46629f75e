package main

import (
	"bytes"
	"errors"
	"fmt"
	"math"

	"github.com/soniakeys/unit"
	"github.com/spf13/cobra"

	"gloam/plan"
	"gloam/plan/sheet"
	"gloam/track"
	"gloam/track/dm"
)

// skyFlags are what the command line says of one instant.
type skyFlags struct {
	settingsFlags
	at, pos       string
	course, speed float64
	disc          string
	overhead      bool
}

func newSky(w world) *cobra.Command {
	f := &skyFlags{}
	cmd := &cobra.Command{
		Use:   "sky",
		Short: "Tell what can be shot at one instant and place",
		Long: "Lists the bodies above the horizon in order of bearing, and why those that\n" +
			"cannot be shot cannot; then the round, the triads and what to set. Arcs under\n" +
			"cloud, blind arcs and bodies left out answer what-if questions.",
		Example: `  gloam sky --at 2027-03-01T18:42Z --pos "49 12.4N 012 30.0W" --course 245 --cloud 180-260`,
		Args:    func(cmd *cobra.Command, args []string) error { return usage(cobra.NoArgs(cmd, args)) },
		RunE:    func(*cobra.Command, []string) error { return f.run(w) },
	}
	flags := cmd.Flags()
	flags.SortFlags = false
	flags.StringVar(&f.at, "at", "", "the instant, as 2027-03-01T18:42Z")
	flags.StringVar(&f.pos, "pos", "", `the position, as "49 12.4N 012 30.0W" or "49.2067,-12.5"`)
	flags.Float64Var(&f.course, "course", 0, "true course, degrees")
	flags.Float64Var(&f.speed, "speed", 0, "speed, knots")
	flags.StringVar(&f.disc, "disc", "", "write the sky as a picture, SVG, to this file")
	flags.BoolVar(&f.overhead, "overhead", false, "the disc as seen looking up, east to the left (default: as on a chart)")
	f.settingsFlags.define(cmd)
	return cmd
}

func (f *skyFlags) run(w world) error {
	if f.at == "" || f.pos == "" {
		return usage(errors.New("--at and --pos are wanted"))
	}
	at, err := parseInstant(f.at)
	if err != nil {
		return usage(fmt.Errorf("--at %w", err))
	}
	lat, lon, err := dm.ParsePosition(f.pos)
	if err != nil {
		return usage(fmt.Errorf("--pos: %w", err))
	}
	if !(math.Abs(f.course) <= 360) || !(f.speed >= 0) {
		return usage(fmt.Errorf("--course %v --speed %v (up to 360 degrees, 0 or more knots)", f.course, f.speed))
	}
	set, err := f.settings(0)
	if err != nil {
		return err
	}
	from := track.PositionFromDeg(lat.Deg(), lon.Deg())
	report, err := plan.NewReport(at, from, unit.AngleFromDeg(f.course).Mod1(), f.speed, set)
	if err != nil {
		return settingError(err)
	}
	var b bytes.Buffer
	if err := report.WriteText(&b, bold(w)); err != nil {
		return err
	}
	outputs := []output{{"-", &b}}
	if f.disc != "" {
		outputs = append(outputs, output{f.disc, bytes.NewBufferString(sheet.DiscFile(&report.Window, &report.Settings, f.overhead))})
	}
	return writeAll(outputs, w.out)
}
