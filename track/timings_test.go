package track

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
	"time"
)

// timingText writes what the file says of each waypoint.
func timingText(r *Route) string {
	var all []string
	for _, w := range r.Waypoints {
		s := w.Name
		for _, at := range []time.Time{w.ETA, w.ETD} {
			if !at.IsZero() {
				s += at.Format(" 02T15:04")
			} else {
				s += " -"
			}
		}
		s += fmt.Sprintf(" %v %v", w.Stay, w.SpeedKn)
		if w.Sailing != nil {
			s += " " + w.Sailing.String()
		}
		all = append(all, strings.TrimSpace(s))
	}
	return strings.Join(all, "; ")
}

// coordTimes are the times at the vertices, as many writers of GeoJSON have
// them; the other lists are this project's.
func TestReadTimings(t *testing.T) {
	stay := `{"type":"Feature","properties":{"name":"B","stay_h":7.5},"geometry":{"type":"Point","coordinates":[1,0]}}`
	for _, c := range []struct{ name, in, want string }{
		{"times", lineFeature(`[[0,0],[1,0],[2,0]]`, `{"coordTimes":["2026-11-20T12:00:00Z",null,"2026-11-21T12:00:00+02:00"]}`),
			"20T12:00 - 0s 0; - - 0s 0; 21T10:00 - 0s 0"},
		{"speeds and sailings", lineFeature(`[[0,0],[1,0],[2,0]]`, `{"speed_kn":[6.5,null],"sailing":[null,"great-circle"]}`), "- - 0s 0; - - 0s 6.5; - - 0s 0 great-circle"},
		{"departure and arrival", lineFeature(`[[0,0],[1,0]]`, `{"departure":"2026-11-20T12:00:00Z","arrival":"2026-11-21T12:00:00Z"}`), "- 20T12:00 0s 0; 21T12:00 - 0s 0"},
		{"a stay", collection(lineFeature(`[[0,0],[1,0],[2,0]]`, `{}`), stay), "- - 0s 0; B - - 7h30m0s 0; - - 0s 0"},
		{"no stay", collection(lineFeature(`[[0,0],[1,0]]`, `{}`), strings.Replace(stay, "7.5", "0", 1)), "- - 0s 0; B - - 0s 0"},
		{"a place twice", lineFeature(`[[0,0],[1,0],[1,0],[2,0]]`, `{"coordTimes":[null,"2026-11-20T12:00:00Z","2026-11-20T18:00:00Z",null],"speed_kn":[5,null,6]}`),
			"- - 0s 0; 20T12:00 20T18:00 0s 5; - - 0s 6"},
		{"cut at the antimeridian", `{"type":"Feature","properties":{"coordTimes":[["2026-11-20T12:00:00Z",null],[null,"2026-11-21T12:00:00Z"]],"speed_kn":[[7],[7]]},` +
			`"geometry":` + multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30]]]`) + `}`, "20T12:00 - 0s 0; 21T12:00 - 0s 7"},
		{"cut with two speeds", `{"type":"Feature","properties":{"speed_kn":[[7],[8]]},"geometry":` + multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30]]]`) + `}`,
			"- - 0s 0; - - 0s 7; - - 0s 8"},
		{"cut with a time", `{"type":"Feature","properties":{"coordTimes":[[null,null],["2026-11-20T12:00:00Z",null]]},"geometry":` + multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30]]]`) + `}`,
			"- - 0s 0; 20T12:00 - 0s 0; - - 0s 0"},
		{"cut with a name", collection(`{"type":"Feature","properties":{},"geometry":`+multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30]]]`)+`}`, pointFeature("On the line", "[180,20]")),
			"- - 0s 0; On the line - - 0s 0; - - 0s 0"},
		{"cut not quite at 180", multiLine(`[[[170,10],[179.9999999,20]],[[-179.9999999,20],[-170,30]]]`), "- - 0s 0; - - 0s 0"},
	} {
		t.Run(c.name, func(t *testing.T) {
			r, err := ReadGeoJSON(strings.NewReader(c.in))
			if err != nil {
				t.Fatal(err)
			}
			if got := timingText(r); got != c.want {
				t.Errorf("timings %s\nwant    %s", got, c.want)
			}
		})
	}
}

func TestReadTimingsRefuses(t *testing.T) {
	line := func(props string) string { return lineFeature(`[[0,0],[1,0],[2,0]]`, props) }
	for _, c := range []struct{ name, in, place, met, allowed, hint string }{
		{"too few times", line(`{"coordTimes":["2026-11-20T12:00:00Z"]}`), "property coordTimes", "1 values", "3, for 3 points", "null"},
		{"speed for each point", line(`{"speed_kn":[1,2,3]}`), "property speed_kn", "3 values", "2, for 3 points", "null"},
		{"no time", line(`{"coordTimes":[null,"noon",null]}`), "property coordTimes, value 2", "noon", "RFC 3339", "mend"},
		{"no zone", line(`{"coordTimes":[null,"2026-11-20T12:00:00",null]}`), "coordTimes, value 2", "2026-11-20T12:00:00", "with a zone", "mend"},
		{"times a number", line(`{"coordTimes":5}`), "coordTimes", "5", "in a list as the coordinates are", "flag"},
		{"times of parts in one list", `{"type":"Feature","properties":{"coordTimes":[null,null,null]},"geometry":` + multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30]]]`) + `}`,
			"coordTimes", "[null,null,null]", "in a list as the coordinates are", "flag"},
		{"speed out of range", line(`{"speed_kn":[5,300]}`), "speed_kn, value 2", "300", "at most 100 kn", "mend"},
		{"speed text", line(`{"speed_kn":["5",null]}`), "speed_kn", `["5",null]`, "speeds", "flag"},
		{"sailing unknown", line(`{"sailing":["rhumb","direct"]}`), "sailing, value 2", "direct", "great-circle", "mend"},
		{"arrival twice", line(`{"coordTimes":[null,null,"2026-11-20T12:00:00Z"],"arrival":"2026-11-20T13:00:00Z"}`), "property arrival", "2026-11-20 13:00 UTC, where coordTimes has 2026-11-20 12:00 UTC", "one time", "take one"},
		{"a stay of years", collection(line(`{}`), `{"type":"Feature","properties":{"name":"B","stay_h":1e5},"geometry":{"type":"Point","coordinates":[1,0]}}`), "stay_h", "1e5", "at most 9600 hours", "flag"},
		{"a stay below zero", collection(line(`{}`), `{"type":"Feature","properties":{"name":"B","stay_h":-1},"geometry":{"type":"Point","coordinates":[1,0]}}`), "stay_h", "-1", "above 0", "flag"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := ReadGeoJSON(strings.NewReader(c.in))
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
		})
	}
}

// What is written is read again as the same passage, to a second and a metre:
// times are written to the second.
func TestGeoJSONRoundTrip(t *testing.T) {
	circle := GreatCircle
	over := &Route{Name: "Over the line", Waypoints: []Waypoint{
		{Name: "A", Position: PositionFromDeg(-36, 174)}, {Position: PositionFromDeg(-38, -178), Timing: Timing{Sailing: &circle, Stay: 30 * time.Hour}},
		{Name: "C", Position: PositionFromDeg(-30, 178)}, {Name: "D", Position: PositionFromDeg(-12, -77), Timing: Timing{SpeedKn: 14}},
	}}
	for name, r := range referenceRoutes(t) {
		checkRoundTrip(t, name, r)
	}
	checkRoundTrip(t, "over the antimeridian three times", over)
}

func checkRoundTrip(t *testing.T, name string, r *Route) {
	t.Helper()
	o := Orders{Departure: noon}
	if !r.Paced() {
		o.SpeedKn = 11
	}
	r.SpeedKn = 11
	p, err := r.Sail(o)
	if err != nil {
		t.Fatal(name, err)
	}
	var b bytes.Buffer
	if err := WriteGeoJSON(&b, p, p.HourlyMarks()); err != nil {
		t.Fatal(err)
	}
	again, err := ReadGeoJSON(&b)
	if err != nil {
		t.Fatal(name, err)
	}
	q, err := again.Sail(Orders{})
	if err != nil {
		t.Fatal(name, err)
	}
	if len(q.Legs) != len(p.Legs) || q.Name != p.Name {
		t.Fatalf("%s: %d legs of %q, want %d of %q", name, len(q.Legs), q.Name, len(p.Legs), p.Name)
	}
	for i, l := range p.Legs {
		m := q.Legs[i]
		if m.ETD.Sub(l.ETD).Abs() > time.Second || m.ETA.Sub(l.ETA).Abs() > time.Second || m.Sailing != l.Sailing && !l.Stays() || m.Stays() != l.Stays() ||
			apart(m.To.Position, l.To.Position) > repeatNM {
			t.Errorf("%s: leg %d comes back as %v..%v %v to %v, want %v..%v %v to %v", name, i, m.ETD, m.ETA, m.Sailing, m.To.Position, l.ETD, l.ETA, l.Sailing, l.To.Position)
		}
	}
}
