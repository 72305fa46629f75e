package track

import (
	"encoding/json"
	"fmt"
	"strings"
	"time"

	"github.com/paulmach/orb"
)

// readTimings puts the line's lists coordTimes, speed_kn and sailing to its
// vertices.
func (f *feature) readTimings(parts [][]vertex) error {
	err := eachOf(f, "coordTimes", parts, 0, func(v *vertex, text string) (err error) {
		v.ETA, err = time.Parse(time.RFC3339, text)
		v.ETA = v.ETA.UTC()
		return err
	}, "RFC 3339 times with a zone, or null")
	if err != nil {
		return err
	}
	err = eachOf(f, "speed_kn", parts, 1, func(v *vertex, kn float64) error {
		v.SpeedKn = kn
		return checkSpeed("", kn)
	}, fmt.Sprintf("speeds above 0, at most %v kn, or null", MaxSpeedKn))
	if err != nil {
		return err
	}
	return eachOf(f, "sailing", parts, 1, func(v *vertex, name string) error {
		s, err := ParseSailing(name)
		v.Sailing = &s
		return err
	}, "rhumb, great-circle or null")
}

// lists tells whether a property is a list.
func (f *feature) lists(key string) bool {
	return strings.HasPrefix(strings.TrimSpace(string(f.properties[key])), "[")
}

// eachOf hands the values of a list to the vertices, from the first or (for
// legs, which belong to the vertex where they end) from the second on.
func eachOf[T any](f *feature, key string, parts [][]vertex, first int, put func(*vertex, T) error, allowed string) error {
	if key != "coordTimes" && !f.lists(key) || len(f.properties[key]) == 0 || string(f.properties[key]) == "null" {
		return nil
	}
	lists := [][]*T{nil}
	into := any(&lists[0])
	if _, many := f.geometry.(orb.MultiLineString); many {
		into = &lists
	}
	if json.Unmarshal(f.properties[key], into) != nil || len(lists) != len(parts) {
		return f.bad(key, allowed+", in a list as the coordinates are")
	}
	for i, list := range lists {
		if len(list) != len(parts[i])-first {
			return &Error{f.place + " property " + key, fmt.Sprintf("%d values", len(list)),
				fmt.Sprintf("%d, for %d points", len(parts[i])-first, len(parts[i])), "give one for each, or null"}
		}
		for j, value := range list {
			if value != nil && put(&parts[i][j+first], *value) != nil {
				return &Error{fmt.Sprintf("%s property %s, value %d", f.place, key, j+1), shorten(fmt.Sprint(*value)), allowed, "mend the property in the file"}
			}
		}
	}
	return nil
}
