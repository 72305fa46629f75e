package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"strings"
	"time"

	"github.com/spf13/cobra"

	"gloam/calendars"
	"gloam/plan"
)

// calendarFlags are what the command line says of the calendar.
type calendarFlags struct {
	ics, update string
	alarms      []string
	busy        bool
	include     string
	included    []plan.ItemKind // what that says; nil where it is not given
}

func (f *calendarFlags) define(cmd *cobra.Command) {
	flags := cmd.Flags()
	flags.StringVar(&f.ics, "ics", "", "write the calendar to this file (- for standard output, alone)")
	flags.StringVar(&f.update, "update", "", "bring this earlier calendar of the voyage up to date")
	flags.StringArrayVar(&f.alarms, "alarm", []string{"20m"}, "calendar alarm before each event, as 20m or 1h; may be given many times; none for none")
	flags.BoolVar(&f.busy, "busy", false, "calendar events take up time (default: free)")
	flags.StringVar(&f.include, "include", "", "what to plan and tell, with commas: "+kindNames()+" (default: all but moonlit; in the calendar stars,noon)")
	_ = cmd.RegisterFlagCompletionFunc("include", cobra.FixedCompletions(strings.Split(kindNames(), ","), cobra.ShellCompDirectiveNoFileComp|cobra.ShellCompDirectiveNoSpace))
}

// options checks the flags.
func (f *calendarFlags) options(stamp time.Time) (calendars.Options, error) {
	opt := calendars.Options{Busy: f.busy, Stamp: stamp}
	var err error
	if f.include != "" {
		if f.included, err = plan.ParseItemKinds(f.include); err != nil {
			return opt, usage(fmt.Errorf("--include %w", err))
		}
	}
	usual := []plan.ItemKind{plan.Stars, plan.Noon}
	if f.update != "" {
		usual = nil // those that the calendar has
	}
	opt.Include = f.kinds(usual)
	if f.ics != "" && f.update != "" {
		return opt, usage(errors.New("--ics and --update: one of the two (--update writes the file it reads)"))
	}
	for _, text := range f.alarms {
		if text == "none" || text == "0" {
			if len(f.alarms) > 1 {
				return opt, usage(errors.New("--alarm none goes alone"))
			}
			return opt, nil
		}
		d, err := time.ParseDuration(text)
		if err != nil || d < time.Second || d > maxAlarm {
			return opt, usage(fmt.Errorf("--alarm %q (1s to 672h before the event, as 20m or 1h; or none)", text))
		}
		opt.Alarms = append(opt.Alarms, d)
	}
	return opt, nil
}

// kinds are those included, or the usual ones.
func (f *calendarFlags) kinds(usual []plan.ItemKind) []plan.ItemKind {
	if f.included == nil {
		return usual
	}
	return f.included
}

func kindNames() string {
	var names []string
	for _, k := range plan.ItemKinds {
		names = append(names, string(k))
	}
	return strings.Join(names, ",")
}

// maxAlarm is how long before an event an alarm may be: four weeks.
const maxAlarm = 4 * 7 * 24 * time.Hour

// updated is an earlier calendar brought up to date, and what changed.
func (f *calendarFlags) updated(p *plan.Plan, opt calendars.Options) (*bytes.Buffer, calendars.Changes, error) {
	old, err := os.Open(f.update)
	if err != nil {
		return nil, nil, cannotRead(f.update, err, "name the calendar that an earlier --ics wrote")
	}
	defer old.Close()
	b := &bytes.Buffer{}
	changes, err := calendars.Update(b, old, p, opt)
	if err != nil {
		return nil, nil, hinted{&fileError{f.update, bare(err)}, "name the calendar that an earlier --ics wrote for this voyage; it is left as it was"}
	}
	return b, changes, nil
}

// writer writes the calendar.
func calendarWriter(p *plan.Plan, opt calendars.Options) func(io.Writer) error {
	return func(w io.Writer) error { return calendars.Write(w, p, opt) }
}
