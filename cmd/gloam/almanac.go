package main

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"sort"
	"strings"
	"time"

	"github.com/agnivade/levenshtein"
	"github.com/spf13/cobra"

	"gloam/astro"
	"gloam/plan/almanac"
)

// almanacFlags are what the command line says of hourly values.
type almanacFlags struct {
	from, plan, format string
	hours              int
	bodies, at         []string
	deltaT             deltaTFlag
}

func newAlmanac(w world) *cobra.Command {
	f := &almanacFlags{}
	cmd := &cobra.Command{
		Use:   "almanac",
		Short: "List hourly values with v and d, or work an instant from them",
		Long: "Lists GHA and Dec at full hours, with v and d, for a span (--from, --hours)\n" +
			"or for what the windows of a plan need (--plan); or works single instants from\n" +
			"hourly values, increment, v and d (--at), beside the place computed directly.",
		Example: "  gloam almanac --from 2027-03-01T00Z --hours 24 --body Sun --body Moon\n" +
			"  gloam almanac --at 2027-03-01T18:42:10Z --body Vega\n" +
			"  gloam almanac --plan plan.json",
		Args: func(cmd *cobra.Command, args []string) error { return usage(cobra.NoArgs(cmd, args)) },
		RunE: func(cmd *cobra.Command, _ []string) error { return f.run(w) },
	}
	flags := cmd.Flags()
	flags.SortFlags = false
	flags.StringVar(&f.from, "from", "", "first hour, as 2027-03-01T00Z")
	flags.IntVar(&f.hours, "hours", 24, "how many full hours")
	flags.StringArrayVar(&f.bodies, "body", nil, "a body; may be given many times (default: Sun, Moon, planets, Aries)")
	flags.StringArrayVar(&f.at, "at", nil, "an instant to work; many times, or - for one a line from standard input")
	flags.StringVar(&f.plan, "plan", "", "a plan's JSON, whose windows' hours and bodies to list")
	flags.StringVar(&f.format, "format", "text", "text, csv or json")
	f.deltaT.define(cmd)
	_ = cmd.RegisterFlagCompletionFunc("format", cobra.FixedCompletions([]string{"text", "csv", "json"}, cobra.ShellCompDirectiveNoFileComp))
	_ = cmd.RegisterFlagCompletionFunc("body", func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
		return bodyNames(), cobra.ShellCompDirectiveNoFileComp
	})
	return cmd
}

func bodyNames() (names []string) {
	for _, b := range astro.Bodies() {
		names = append(names, b.String())
	}
	return names
}

// run writes what could be answered, also where some lines could not.
func (f *almanacFlags) run(w world) error {
	if err := f.check(); err != nil {
		return usage(err)
	}
	var out bytes.Buffer
	var err error
	if len(f.at) > 0 {
		err = f.instants(w, &out)
	} else {
		err = f.list(&out)
	}
	if out.Len() > 0 {
		if _, failed := w.out.Write(out.Bytes()); failed != nil {
			return failed
		}
	}
	return err
}

// check sees that one way of asking is used, and used well.
func (f *almanacFlags) check() error {
	ways := 0
	for _, used := range []bool{f.from != "", len(f.at) > 0, f.plan != ""} {
		if used {
			ways++
		}
	}
	switch {
	case ways != 1:
		return errors.New("one of --from, --at and --plan is wanted")
	case f.plan != "" && len(f.bodies) > 0:
		return errors.New("--body does not go with --plan, which names its own")
	case f.hours < 1 || f.hours > almanac.MaxHours:
		return fmt.Errorf("--hours %d (1 to %d, 400 days)", f.hours, almanac.MaxHours)
	case f.format != "text" && f.format != "csv" && f.format != "json":
		return fmt.Errorf("--format %q (text, csv or json)", f.format)
	}
	return nil
}

// list writes the hours of a span or of a plan.
func (f *almanacFlags) list(w io.Writer) error {
	rows, err := f.rows()
	if err != nil {
		return err
	}
	switch f.format {
	case "csv":
		return almanac.WriteCSV(w, rows)
	case "json":
		return almanac.WriteJSON(w, rows)
	}
	return almanac.WriteText(w, rows)
}

func (f *almanacFlags) rows() ([]astro.Hourly, error) {
	if f.plan != "" {
		file, err := os.Open(f.plan)
		if err != nil {
			return nil, cannotRead(f.plan, err, "name a file that gloam plan --json wrote")
		}
		defer file.Close()
		needs, err := almanac.ReadNeeds(file)
		if err != nil {
			return nil, hinted{&fileError{f.plan, err}, "name a file that gloam plan --json wrote"}
		}
		return almanac.ForNeeds(needs, f.deltaT.at), nil
	}
	from, err := parseInstant(f.from)
	if err != nil {
		return nil, usage(fmt.Errorf("--from %w", err))
	}
	if end := from.Add(time.Duration(f.hours) * time.Hour); !almanac.Serves(from) || !almanac.Serves(end) {
		return nil, &outsideError{"--from", f.from}
	}
	bodies, err := f.parseBodies()
	if err != nil {
		return nil, err
	}
	return almanac.Hours(bodies, from, f.hours, f.deltaT.at), nil
}

// parseBodies reads the bodies asked for.
func (f *almanacFlags) parseBodies() ([]astro.Body, error) {
	if len(f.bodies) == 0 {
		return append([]astro.Body{astro.Aries, astro.Sun, astro.Moon}, astro.Planets()...), nil
	}
	return parseBodies("--body", f.bodies)
}

// parseBodies reads the names of bodies that a flag gives.
func parseBodies(flag string, names []string) (all []astro.Body, err error) {
	for _, name := range names {
		b, err := astro.ParseBody(name)
		if err != nil {
			return nil, usage(fmt.Errorf("%s: %w; nearest: %s", flag, err, strings.Join(nearest(name), ", ")))
		}
		all = append(all, b)
	}
	return all, nil
}

// nearest gives the three names of bodies spelt most like one.
func nearest(name string) []string {
	names := bodyNames()
	distance := func(s string) int { return levenshtein.ComputeDistance(strings.ToLower(s), strings.ToLower(name)) }
	sort.SliceStable(names, func(i, j int) bool { return distance(names[i]) < distance(names[j]) })
	return names[:3]
}

// instants works every instant for every body; those that cannot be read are
// told at the end.
func (f *almanacFlags) instants(w world, out io.Writer) error {
	bodies, err := f.parseBodies()
	if err != nil {
		return err
	}
	times, bad := f.times(w.in)
	var worked []astro.Worked
	var rows []astro.Hourly
	for _, t := range times {
		for _, b := range bodies {
			if f.format == "text" {
				worked = append(worked, astro.Work(b, t, f.deltaT.at))
			} else {
				rows = append(rows, astro.NewHourly(b, t, f.deltaT.at))
			}
		}
	}
	switch {
	case len(times) == 0:
	case f.format == "csv":
		err = almanac.WriteCSV(out, rows)
	case f.format == "json":
		err = almanac.WriteJSON(out, rows)
	default:
		err = almanac.WriteWorked(out, worked)
	}
	return errors.Join(append(bad, err)...)
}

// times reads the instants asked for, with "-" those of standard input.
func (f *almanacFlags) times(stdin io.Reader) (times []time.Time, bad []error) {
	read := func(place, text string) {
		t, err := parseInstant(text)
		switch {
		case err != nil:
			bad = append(bad, fmt.Errorf("%s: %w", place, err))
		case !almanac.Serves(t):
			bad = append(bad, &outsideError{place, text})
		default:
			times = append(times, t)
		}
	}
	for _, text := range f.at {
		if text != "-" {
			read("--at", text)
			continue
		}
		lines := bufio.NewScanner(stdin)
		for n := 1; lines.Scan(); n++ {
			if line := strings.TrimSpace(lines.Text()); line != "" {
				read(fmt.Sprintf("standard input: line %d", n), line)
			}
		}
		if err := lines.Err(); err != nil {
			bad = append(bad, fmt.Errorf("standard input: %w", err))
		}
	}
	return times, bad
}

// outsideError is an instant for which no places are computed.
type outsideError struct{ place, met string }

func (e *outsideError) Error() string {
	return fmt.Sprintf("%s: %s (%d to %d)", e.place, e.met, almanac.Earliest.Year(), almanac.Latest.Year()-1)
}
