package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"time"

	"gloam/plan"
	"gloam/track"
)

func readRoute(file string, stdin io.Reader) (*track.Route, error) {
	in := stdin
	if file != "-" {
		f, err := os.Open(file)
		if err != nil {
			return nil, cannotRead(file, err, "name a GeoJSON file with the route to sail")
		}
		defer f.Close()
		in = f
	}
	route, err := track.ReadGeoJSON(in)
	if err != nil {
		return nil, &fileError{file, err}
	}
	return route, nil
}

// plan joins flags and file; flags win.
func (f *planFlags) plan(file string, r *track.Route) (*plan.Plan, error) {
	passage, err := f.sail(file, r)
	if err != nil {
		return nil, err
	}
	set, err := f.settings(r.EyeM)
	if err != nil {
		return nil, err
	}
	p, err := plan.New(passage, set)
	if err != nil {
		return nil, hinted{err, settingHint}
	}
	p.Notes = r.Notes
	return p, nil
}

func (f *planFlags) sail(file string, r *track.Route) (*track.Passage, error) {
	departure, speed, how := r.Departure, r.SpeedKn, track.Rhumb
	var err error
	if r.Sailing != nil {
		how = *r.Sailing
	}
	if f.changed("depart") {
		if departure, err = parseInstant(f.depart); err != nil {
			return nil, usage(fmt.Errorf("--depart %w", err))
		}
	}
	if f.changed("sailing") {
		if how, err = track.ParseSailing(f.sailing); err != nil {
			return nil, usage(fmt.Errorf("--%w", err))
		}
	}
	if f.changed("speed") {
		speed = f.speed
	}
	switch {
	case departure.IsZero():
		err = missing("departure", "RFC 3339, as 2026-11-20T12:00:00Z", "give --depart, or the property departure of the line")
	case speed == 0 && !f.changed("speed"):
		err = missing("speed", "knots", "give --speed, or the property speed_kn of the line")
	}
	if err != nil {
		return nil, &fileError{file, err}
	}
	p, err := r.Sail(departure, speed, how)
	if err != nil {
		return nil, f.blame(file, err)
	}
	return p, nil
}

func missing(place, allowed, hint string) error {
	return &track.Error{Place: place, Met: "missing", Allowed: allowed, Hint: hint}
}

// blame puts an error of the passage to the flag that brought the value, or
// to the file.
func (f *planFlags) blame(file string, err error) error {
	var t *track.Error
	if errors.As(err, &t) {
		for place, flag := range map[string]string{"departure": "depart", "speed": "speed"} {
			if t.Place == place && f.changed(flag) {
				t.Place = "--" + flag
				return t
			}
		}
	}
	return &fileError{file, err}
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
