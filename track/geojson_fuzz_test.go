package track

import (
	"bytes"
	"errors"
	"math"
	"testing"
	"time"

	"github.com/soniakeys/unit"
)

// FuzzReadGeoJSON: whatever the file holds, the reader either refuses it with
// an *Error or gives a route that can be sailed.
func FuzzReadGeoJSON(f *testing.F) {
	for _, c := range goodRoutes {
		f.Add([]byte(c.in))
	}
	for _, c := range badRoutes {
		if len(c.in) < 1000 { // long seeds stall the fuzzer while it shortens them
			f.Add([]byte(c.in))
		}
	}
	f.Add([]byte(lineFeature(`[[0,1],[2,3]]`, `{"name":"A","departure":"2026-11-20T12:00:00Z","speed_kn":12,"sailing":"rhumb","eye_m":9}`)))
	f.Fuzz(func(t *testing.T, data []byte) {
		r, err := ReadGeoJSON(bytes.NewReader(data))
		if err != nil {
			wantPlainError(t, err)
			if r != nil {
				t.Error("a route came with the error")
			}
			return
		}
		checkRoute(t, r)
		for _, s := range []Sailing{Rhumb, GreatCircle} {
			checkSailed(t, r, s)
		}
	})
}

// wantPlainError wants an *Error with all its parts filled.
func wantPlainError(t *testing.T, err error) {
	t.Helper()
	var e *Error
	if !errors.As(err, &e) {
		t.Fatalf("error %v of type %T, want *Error", err, err)
	}
	if e.Place == "" || e.Met == "" || e.Allowed == "" || e.Hint == "" {
		t.Errorf("error with an empty part: %#v", e)
	}
}

// checkRoute checks what the docs of Route and Position promise.
func checkRoute(t *testing.T, r *Route) {
	t.Helper()
	if len(r.Waypoints) < 2 {
		t.Fatalf("%d waypoints, want two or more", len(r.Waypoints))
	}
	for i, w := range r.Waypoints {
		if !(math.Abs(w.Lat.Rad()) <= MaxLatitude.Rad()) || !inLonRange(w.Lon) {
			t.Errorf("waypoint %d out of range: %v %v", i, w.Lat.Deg(), w.Lon.Deg())
		}
		if i > 0 && near(r.Waypoints[i-1].Position, w.Position, repeatNM) {
			t.Errorf("waypoint %d repeats the one before it", i)
		}
	}
	if !(r.SpeedKn >= 0 && r.EyeM >= 0) {
		t.Errorf("speed %v or height of eye %v below zero", r.SpeedKn, r.EyeM)
	}
}

// checkSailed sails the route at its own speed and time, or at invented ones.
func checkSailed(t *testing.T, r *Route, s Sailing) {
	t.Helper()
	o := Orders{Sailing: &s}
	if r.SpeedKn == 0 {
		o.SpeedKn = 12
	}
	if !r.Waypoints[0].timed() {
		o.Departure = time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)
	}
	p, err := r.Sail(o)
	if err != nil {
		wantPlainError(t, err)
		return
	}
	if p.Arrival.Before(p.Departure) {
		t.Errorf("%v: arrives %v, before departure %v", s, p.Arrival, p.Departure)
	}
	half := p.Departure.Add(p.Arrival.Sub(p.Departure) / 2)
	for _, at := range []time.Time{p.Departure, half, p.Arrival} {
		fix := p.At(at)
		if !(math.Abs(fix.Lat.Deg()) <= 90) || !inLonRange(fix.Lon) || !inCourseRange(fix.Course) {
			t.Errorf("%v at %v: out of range: %v %v course %v", s, at, fix.Lat.Deg(), fix.Lon.Deg(), fix.Course.Deg())
		}
	}
}

// inLonRange tells whether a longitude is in (-180°, 180°]; NaN is not.
func inLonRange(lon unit.Angle) bool { return lon.Rad() > -math.Pi && lon.Rad() <= math.Pi }

// inCourseRange tells whether a course is in [0°, 360°); NaN is not.
func inCourseRange(c unit.Angle) bool { return c >= 0 && c.Rad() < 2*math.Pi }
