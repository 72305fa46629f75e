package main

import (
	"bytes"
	"fmt"
	"io"
	"os"
	"strconv"
	"time"

	"github.com/spf13/cobra"
	"golang.org/x/sync/errgroup"
	"golang.org/x/term"

	"gloam/calendars"
	"gloam/plan"
	"gloam/plan/sheet"
	"gloam/track"
)

// planFlags are what the command line says of a plan.
type planFlags struct {
	settingsFlags
	voyageFlags
	calendarFlags
	json, sheet string
	overhead    bool
}

func newPlan(w world) *cobra.Command {
	f := &planFlags{}
	cmd := &cobra.Command{
		Use:   "plan ROUTE",
		Short: "Plan the sights of a passage",
		Long: "Reads a route (GeoJSON, GPX or RTZ; - for standard input) and prints the\n" +
			"plan: for each ship's date the twilights, the day's work, the windows for star\n" +
			"sights, the triads that give the best fix and what to set on the sextant. Flags\n" +
			"win over what the file says of schedule, sailing and height of eye.",
		Example: "  gloam plan route.geojson --depart 2026-11-20T12:00Z --speed 6.5 --ics plan.ics",
		Args:    func(cmd *cobra.Command, args []string) error { return usage(cobra.ExactArgs(1)(cmd, args)) },
		RunE: func(cmd *cobra.Command, args []string) error {
			return f.run(args[0], w)
		},
		ValidArgsFunction: routeFiles,
	}
	f.define(cmd)
	return cmd
}

func (f *planFlags) define(cmd *cobra.Command) {
	flags := cmd.Flags()
	flags.SortFlags = false
	f.voyageFlags.define(cmd)
	f.calendarFlags.define(cmd)
	flags.StringVar(&f.json, "json", "", "write the plan as JSON to this file (- for standard output, alone)")
	flags.StringVar(&f.sheet, "sheet", "", "write the plan as an HTML page, to print and for the phone (- for standard output, alone)")
	flags.BoolVar(&f.overhead, "overhead", false, "sky discs as seen looking up, east to the left (default: as on a chart)")
	f.settingsFlags.define(cmd)
}

// run makes the plan, then writes the files, then prints the text.
func (f *planFlags) run(file string, w world) error {
	stamp, err := stampTime(w)
	if err != nil {
		return err
	}
	opt, err := f.options(stamp)
	if err != nil {
		return err
	}
	if err := f.check(file); err != nil {
		return err
	}
	route, err := readRoute(file, w.in)
	if err != nil {
		return err
	}
	p, err := f.plan(file, route)
	if err != nil {
		return err
	}
	outputs, err := f.outputs(p, opt, w)
	if err != nil {
		return err
	}
	return writeAll(outputs, w.out)
}

// plan joins flags and file; flags win.
func (f *planFlags) plan(file string, r *track.Route) (*plan.Plan, error) {
	passage, rule, err := f.sail(file, r)
	if err != nil {
		return nil, err
	}
	set, err := f.settings(r.EyeM)
	if err != nil {
		return nil, err
	}
	set.ShipTime = rule
	set.Kinds = f.kinds(plan.UsualKinds)
	if f.update != "" && f.included == nil {
		set.Kinds = plan.ItemKinds // the calendar may have any
	}
	p, err := plan.New(passage, set)
	if err != nil {
		return nil, settingError(err)
	}
	p.Notes = r.Notes
	return p, nil
}

// check refuses outputs that would overwrite each other or the route.
func (f *planFlags) check(route string) error {
	calendar, flag := f.ics, "--ics"
	if f.update != "" {
		calendar, flag = f.update, "--update"
	}
	paths := []struct{ flag, path string }{{flag, calendar}, {"--json", f.json}, {"--sheet", f.sheet}}
	for i, a := range paths {
		if sameFile(a.path, route) {
			return usage(fmt.Errorf("%s names the route file, which would be lost", a.flag))
		}
		for _, b := range paths[i+1:] {
			if sameOutput(a.path, b.path) {
				return usage(fmt.Errorf("%s and %s name the same output", a.flag, b.flag))
			}
		}
	}
	return nil
}

// stampTime is the time put into calendars: SOURCE_DATE_EPOCH, or the clock's.
func stampTime(w world) (time.Time, error) {
	text := w.env("SOURCE_DATE_EPOCH")
	if text == "" {
		return w.now().UTC(), nil
	}
	seconds, err := strconv.ParseInt(text, 10, 64)
	if err != nil || seconds < 0 || seconds > track.Latest.Unix() {
		return time.Time{}, fmt.Errorf("SOURCE_DATE_EPOCH: %q (seconds since 1970)", text)
	}
	return time.Unix(seconds, 0).UTC(), nil
}

// outputs prints the plan in all the forms asked for, at the same time; the
// text comes last and is left out where standard output is taken.
func (f *planFlags) outputs(p *plan.Plan, opt calendars.Options, w world) ([]output, error) {
	var all []output
	var group errgroup.Group
	add := func(path string, write func(io.Writer) error) {
		if path == "" {
			return
		}
		b := &bytes.Buffer{}
		all = append(all, output{path, b})
		group.Go(func() error { return write(b) })
	}
	add(f.ics, calendarWriter(p, opt))
	kinds := f.kinds(plan.UsualKinds)
	add(f.json, func(b io.Writer) error { return p.WriteJSON(b, kinds) })
	add(f.sheet, func(b io.Writer) error { return sheet.Write(b, p, sheet.Options{Kinds: kinds, Overhead: f.overhead}) })
	var changes calendars.Changes
	if f.update != "" {
		b, found, err := f.updated(p, opt)
		if err != nil {
			return nil, err
		}
		all, changes = append(all, output{f.update, b}), found
	}
	if f.ics != "-" && f.json != "-" && f.sheet != "-" {
		add("-", func(b io.Writer) error {
			if err := p.WriteText(b, kinds, bold(w)); err != nil || f.update == "" {
				return err
			}
			return changes.WriteText(b, p.Clock.At)
		})
	}
	return all, group.Wait()
}

// bold tells whether standard output is a terminal that wants bold headings.
func bold(w world) bool {
	f, ok := w.out.(*os.File)
	return ok && term.IsTerminal(int(f.Fd())) && w.env("NO_COLOR") == "" && w.env("TERM") != "dumb"
}
