package track

import (
	"encoding/json"
	"strings"
	"time"
	"unicode"

	"github.com/paulmach/orb"
)

// nameVertices gives each vertex the name of the first Point that lies on it.
func nameVertices(vertices []Waypoint, points []feature) error {
	for _, f := range points {
		name, err := f.name()
		if err != nil {
			return err
		}
		if name == "" {
			continue
		}
		p := f.geometry.(orb.Point)
		place := PositionFromDeg(p.Lat(), p.Lon())
		for i := range vertices {
			if vertices[i].Name == "" && near(vertices[i].Position, place, waypointNM) {
				vertices[i].Name = name
			}
		}
	}
	return nil
}

// fill copies the line's properties into the route.
func (f *feature) fill(r *Route) (err error) {
	if r.Name, err = f.name(); err != nil {
		return err
	}
	departure, err := f.text("departure")
	if err != nil {
		return err
	}
	if departure != "" {
		if r.Departure, err = time.Parse(time.RFC3339, departure); err != nil {
			return f.bad("departure", "RFC 3339 with a zone, as 2026-11-20T12:00:00Z")
		}
	}
	if r.SpeedKn, err = f.number("speed_kn"); err != nil {
		return err
	}
	if r.EyeM, err = f.number("eye_m"); err != nil {
		return err
	}
	sailing, err := f.text("sailing")
	if err != nil || sailing == "" {
		return err
	}
	s, err := ParseSailing(sailing)
	if err != nil {
		return f.bad("sailing", "rhumb or great-circle")
	}
	r.Sailing = &s
	return nil
}

// name is the property name, fit to be printed: control characters and line
// breaks become blanks.
func (f *feature) name() (string, error) {
	name, err := f.text("name")
	blank := func(r rune) rune {
		if unicode.IsControl(r) || unicode.In(r, unicode.Zl, unicode.Zp, unicode.Cf) {
			return ' '
		}
		return r
	}
	return strings.Join(strings.Fields(strings.Map(blank, name)), " "), err
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
	s = strings.Join(strings.Fields(s), " ")
	if r := []rune(s); len(r) > 60 {
		return string(r[:60]) + "..."
	}
	return s
}
