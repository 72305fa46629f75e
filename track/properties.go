package track

import (
	"encoding/json"
	"fmt"
	"strings"
	"time"
	"unicode"

	"github.com/paulmach/orb"
)

// call is what a Point says of the waypoint on which it lies: property stay_h
// is the time the ship stays there, in hours.
func (f *feature) call() (w Waypoint, err error) {
	p := f.geometry.(orb.Point)
	w.Position = PositionFromDeg(p.Lat(), p.Lon())
	if w.Name, err = f.name(); err != nil {
		return w, err
	}
	if string(f.properties["stay_h"]) == "0" {
		return w, nil
	}
	hours, err := f.number("stay_h")
	if hours > MaxDuration.Hours() {
		return w, f.bad("stay_h", fmt.Sprintf("at most %.0f hours", MaxDuration.Hours()))
	}
	w.Stay = hoursToDuration(hours)
	return w, err
}

// fill copies the line's properties into the route. Those that are lists are
// the legs' own: see readTimings.
func (f *feature) fill(r *Route) (err error) {
	if r.Name, err = f.name(); err != nil {
		return err
	}
	first, last := &r.Waypoints[0], &r.Waypoints[len(r.Waypoints)-1]
	if err := f.time("departure", &first.ETD); err != nil {
		return err
	}
	if err := f.time("arrival", &last.ETA); err != nil {
		return err
	}
	if r.EyeM, err = f.number("eye_m"); err != nil {
		return err
	}
	if !f.lists("speed_kn") {
		if r.SpeedKn, err = f.number("speed_kn"); err != nil {
			return err
		}
	}
	if !f.lists("sailing") {
		r.Sailing, err = f.sailing()
	}
	return err
}

// time reads a property that is a time, if it is there.
func (f *feature) time(key string, into *time.Time) error {
	text, err := f.text(key)
	if err != nil || text == "" {
		return err
	}
	t, err := time.Parse(time.RFC3339, text)
	if err != nil {
		return f.bad(key, "RFC 3339 with a zone, as 2026-11-20T12:00:00Z")
	}
	if at := t.UTC(); into.IsZero() {
		*into = at
	} else if !into.Equal(at) {
		return &Error{f.place + " property " + key, fmt.Sprintf("%s, where coordTimes has %s", timeText(at), timeText(*into)),
			"one time", "take one of the two out"}
	}
	return nil
}

func (f *feature) sailing() (*Sailing, error) {
	name, err := f.text("sailing")
	if err != nil || name == "" {
		return nil, err
	}
	s, err := ParseSailing(name)
	if err != nil {
		return nil, f.bad("sailing", "rhumb or great-circle")
	}
	return &s, nil
}

// name is the property name, fit to be printed.
func (f *feature) name() (string, error) {
	name, err := f.text("name")
	return printable(name), err
}

// printable is a text on one line: control characters and line breaks become
// blanks, and of blanks one is kept.
func printable(s string) string {
	blank := func(r rune) rune {
		if unicode.IsControl(r) || unicode.In(r, unicode.Zl, unicode.Zp, unicode.Cf) {
			return ' '
		}
		return r
	}
	return strings.Join(strings.Fields(strings.Map(blank, s)), " ")
}

func (f *feature) text(key string) (string, error) {
	var v *string
	if raw, ok := f.properties[key]; ok && json.Unmarshal(raw, &v) != nil {
		return "", f.bad(key, "text")
	}
	if v == nil {
		return "", nil
	}
	return *v, nil
}

// number reads a property that must be above zero where it is given.
func (f *feature) number(key string) (float64, error) {
	var v *float64
	if raw, ok := f.properties[key]; ok && (json.Unmarshal(raw, &v) != nil || v != nil && *v <= 0) {
		return 0, f.bad(key, "a number above 0")
	}
	if v == nil {
		return 0, nil
	}
	return *v, nil
}

func (f *feature) bad(key, allowed string) error {
	return &Error{f.place + " property " + key, shorten(string(f.properties[key])), allowed, "mend the property in the file, or take it out and give the flag"}
}

// shorten keeps a value met in a file fit for one line of an error.
func shorten(s string) string {
	s = printable(s)
	if r := []rune(s); len(r) > 60 {
		return string(r[:60]) + "..."
	}
	return s
}
