package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"time"

	"github.com/spf13/cobra"

	"gloam/track"
	"gloam/track/dm"
)

// voyageFlags are what the command line says of route, schedule and clock.
type voyageFlags struct {
	depart, arrive, sailing, shipTime string
	speed                             float64
	fromPosition, fromTime            string
	late                              time.Duration
	history                           bool
	given                             func(string) bool
}

func (f *voyageFlags) define(cmd *cobra.Command) {
	flags := cmd.Flags()
	f.given = flags.Changed
	flags.StringVar(&f.depart, "depart", "", "departure, UTC or with a zone: 2026-11-20T12:00Z; moves the file's schedule")
	flags.StringVar(&f.arrive, "arrive", "", "arrival; the speed follows")
	flags.Float64Var(&f.speed, "speed", 0, "speed made good, knots; under way, from there on")
	flags.StringVar(&f.sailing, "sailing", "rhumb", "rhumb or great-circle, on every leg")
	flags.StringVar(&f.shipTime, "ship-time", "auto", "auto (nautical zones), utc, an offset, a zone name, or dates: 2026-11-24=-02:00,...")
	flags.StringVar(&f.fromPosition, "from-position", "", `under way: where the ship is, as "49 12.4N 012 30.0W"`)
	flags.StringVar(&f.fromTime, "from-time", "", "under way: when she is there")
	flags.DurationVar(&f.late, "late", 0, "the ship is late by so much, as 6h; what is not yet past shifts")
	flags.BoolVar(&f.history, "history", false, "under way: keep what lies before --from-time")
	_ = cmd.RegisterFlagCompletionFunc("sailing", cobra.FixedCompletions([]string{"rhumb", "great-circle"}, cobra.ShellCompDirectiveNoFileComp))
	_ = cmd.RegisterFlagCompletionFunc("ship-time", cobra.FixedCompletions([]string{"auto", "utc"}, cobra.ShellCompDirectiveNoFileComp))
}

// routeFiles completes names of route files.
func routeFiles(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
	return []string{"geojson", "json", "gpx", "rtz"}, cobra.ShellCompDirectiveFilterFileExt
}

func readRoute(file string, stdin io.Reader) (*track.Route, error) {
	in := stdin
	if file != "-" {
		f, err := os.Open(file)
		if err != nil {
			return nil, cannotRead(file, err, "name a file with the route to sail")
		}
		defer f.Close()
		in = f
	}
	route, err := track.Read(in)
	if err != nil {
		return nil, &fileError{file, err}
	}
	return route, nil
}

// sail makes the passage and the rule of its clock; flags win over the file.
// What the user should know of it is added to the route's notes.
func (f *voyageFlags) sail(file string, r *track.Route) (*track.Passage, track.ShipTime, error) {
	rule, err := track.ParseShipTime(f.shipTime)
	if err != nil {
		return nil, nil, usage(fmt.Errorf("--ship-time %w", err))
	}
	now, err := f.underWay()
	if err != nil {
		return nil, nil, err
	}
	orders, err := f.orders(now != nil && r.Paced())
	if err != nil {
		return nil, nil, err
	}
	p, err := r.Sail(orders)
	if err == nil && now != nil {
		p, err = rejoin(p, *now, r)
	}
	if err != nil {
		return nil, nil, f.blame(file, err)
	}
	return p, rule, nil
}

// orders are the flags that go over the file. Under way a speed is one for the
// rest, unless the file has none.
func (f *voyageFlags) orders(keepSpeed bool) (o track.Orders, err error) {
	if o.Departure, err = optionalInstant("depart", f.depart); err != nil {
		return o, err
	}
	if o.Arrival, err = optionalInstant("arrive", f.arrive); err != nil {
		return o, err
	}
	if f.given("sailing") {
		s, err := track.ParseSailing(f.sailing)
		if err != nil {
			return o, usage(fmt.Errorf("--%w", err))
		}
		o.Sailing = &s
	}
	if f.given("speed") && !(f.speed > 0) {
		return o, usage(fmt.Errorf("--speed: %v kn (above 0, at most %v kn)", f.speed, track.MaxSpeedKn))
	}
	if !keepSpeed {
		o.SpeedKn = f.speed
	}
	return o, nil
}

// underWay is nil for a ship that has not left.
func (f *voyageFlags) underWay() (*track.UnderWay, error) {
	u := track.UnderWay{Late: f.late, SpeedKn: f.speed, History: f.history}
	var err error
	if u.Time, err = optionalInstant("from-time", f.fromTime); err != nil {
		return nil, err
	}
	switch {
	case f.late < 0:
		return nil, usage(fmt.Errorf("--late %v (0 or more, as 6h)", f.late))
	case f.fromPosition != "" && (f.fromTime == "" || f.late != 0):
		return nil, usage(errors.New("--from-position goes with --from-time, and without --late, which it tells itself"))
	case f.history && f.fromTime == "":
		return nil, usage(errors.New("--history goes with --from-time"))
	case f.fromTime == "" && f.late == 0:
		return nil, nil
	}
	if f.fromTime == "" { // she has not left: the speed is the whole passage's
		u.SpeedKn = 0
	}
	if f.fromPosition != "" {
		lat, lon, err := dm.ParsePosition(f.fromPosition)
		if err != nil {
			return nil, usage(fmt.Errorf("--from-position: %w", err))
		}
		at := track.PositionFromDeg(lat.Deg(), lon.Deg())
		u.Position = &at
	}
	return &u, nil
}

// farOffNM is how far off the route a ship may be without a word about it.
const farOffNM = 1

func rejoin(p *track.Passage, now track.UnderWay, r *track.Route) (*track.Passage, error) {
	rest, off, err := p.Rejoin(now)
	if err == nil && off > farOffNM {
		r.Notes = append(r.Notes, fmt.Sprintf("the ship is %.1f NM off the route; she makes for %s", off, rest.Legs[rest.At(now.Time).Leg].To.Label()))
	}
	return rest, err
}

// flagOf names the flags that bring what an error names.
var flagOf = map[string]string{"departure": "depart", "arrival": "arrive", "speed": "speed", "time": "from-time", "position": "from-position"}

// blame puts an error of the passage to the flag that brought the value, or
// to the file.
func (f *voyageFlags) blame(file string, err error) error {
	var t *track.Error
	if errors.As(err, &t) {
		if flag := flagOf[t.Place]; flag != "" && f.given(flag) {
			t.Place = "--" + flag
			return t
		}
	}
	return &fileError{file, err}
}

func optionalInstant(flag, text string) (time.Time, error) {
	if text == "" {
		return time.Time{}, nil
	}
	t, err := parseInstant(text)
	if err != nil {
		return t, usage(fmt.Errorf("--%s %w", flag, err))
	}
	return t, nil
}

// parseInstant reads RFC 3339, of which seconds and minutes may be left out.
func parseInstant(text string) (time.Time, error) {
	for _, layout := range []string{time.RFC3339, "2006-01-02T15:04Z07:00", "2006-01-02T15Z07:00"} {
		if t, err := time.Parse(layout, text); err == nil {
			return t, nil
		}
	}
	return time.Time{}, fmt.Errorf("%q (a time with its zone, as 2026-11-20T12:00Z)", text)
}
