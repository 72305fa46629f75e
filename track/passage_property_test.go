package track

import (
	"math"
	"testing"
	"time"

	"pgregory.net/rapid"
)

// drawPlace draws a place up to lat degrees of latitude, often on a round
// number or at the edge.
func drawPlace(t *rapid.T, lat float64) Position {
	if rapid.Bool().Draw(t, "whole degrees") {
		n := int(lat)
		return PositionFromDeg(float64(rapid.IntRange(-n, n).Draw(t, "lat")), float64(rapid.IntRange(-180, 180).Draw(t, "lon")))
	}
	return PositionFromDeg(rapid.Float64Range(-lat, lat).Draw(t, "lat"), rapid.Float64Range(-180, 180).Draw(t, "lon"))
}

// drawPassage draws a passage of two to six waypoints.
func drawPassage(t *rapid.T, lat float64) *Passage {
	vertices := make([]Waypoint, rapid.IntRange(2, 6).Draw(t, "waypoints"))
	for i := range vertices {
		vertices[i].Position = drawPlace(t, lat)
	}
	r, err := newRoute(vertices, len(vertices))
	if err != nil {
		t.Skip(err) // all at one place
	}
	departure := Earliest.Add(time.Duration(rapid.Int64Range(0, int64(Latest.Sub(Earliest)-1)).Draw(t, "departure")))
	how := rapid.SampledFrom([]Sailing{Rhumb, GreatCircle}).Draw(t, "sailing")
	p, err := r.Sail(Orders{Departure: departure, SpeedKn: rapid.Float64Range(8, MaxSpeedKn).Draw(t, "speed"), Sailing: &how})
	if err != nil {
		t.Skip(err) // over 400 days
	}
	return p
}

// sailed measures, from the places themselves, how far the ship has come.
func sailed(p *Passage, f Fix) float64 {
	leg := p.Legs[f.Leg]
	nm := 0.0
	for _, l := range p.Legs[:f.Leg] {
		nm += l.DistanceNM
	}
	return nm + NewLeg(leg.From, Waypoint{Position: f.Position}, leg.Sailing).DistanceNM
}

// At any instant place and course are in range, and the distance sailed is
// speed times time. 1e-5 NM is 2 cm, 1e-9 of the longest way. Source: none, the
// ranges are those the package states.
func TestAtAnyInstant(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPassage(t, 89.9)
		under := int64(p.Arrival.Sub(p.Departure))
		a := time.Duration(rapid.Int64Range(0, under).Draw(t, "first"))
		b := time.Duration(rapid.Int64Range(int64(a), under).Draw(t, "second"))
		for _, d := range []time.Duration{a, b} {
			f := p.At(p.Departure.Add(d))
			if !inLonRange(f.Lon) || !inCourseRange(f.Course) || !(math.Abs(f.Lat.Rad()) <= math.Pi/2) {
				t.Errorf("%v out: %v %v course %v", d, f.Lat.Deg(), f.Lon.Deg(), f.Course.Deg())
			}
			if got, want := sailed(p, f), f.SpeedKn*d.Hours(); math.Abs(got-want) > 1e-5 {
				t.Errorf("%v out: %.7f NM sailed, want %.7f", d, got, want)
			}
		}
		if fa, fb := p.At(p.Departure.Add(a)), p.At(p.Departure.Add(b)); fb.Leg < fa.Leg {
			t.Errorf("leg %d at %v, leg %d at %v", fa.Leg, a, fb.Leg, b)
		}
	})
}

// Course and distance lead back to the place they were taken to, also where
// the line runs nearly east-west. 1e-6 NM is 2 mm, as against the outside
// values of testdata/sailings.csv.
func TestRhumbDirectClosesInverse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		from, to := drawPlace(t, 89.9), drawPlace(t, 89.9)
		if rapid.Bool().Draw(t, "nearly east-west") {
			step := math.Pow(10, rapid.Float64Range(-16, 0).Draw(t, "log of degrees of latitude"))
			to = PositionFromDeg(math.Max(from.Lat.Deg()-step, -89.9), to.Lon.Deg())
		}
		course, nm := rhumb(from, to)
		if !inCourseRange(course) || !(nm >= 0) {
			t.Fatalf("course %v, %v NM", course.Deg(), nm)
		}
		end := rhumbDirect(from, course, nm)
		if d := apart(end, to); !(d <= 1e-6) || !inLonRange(end.Lon) {
			t.Errorf("ends %v NM away, longitude %v", d, end.Lon.Deg())
		}
		if back, same := rhumb(to, from); math.Abs(same-nm) > 1e-6 || nm > 1 && math.Abs(math.Abs(wrap(back-course).Deg())-180) > 1e-6 &&
			math.Abs(math.Abs(wrap(to.Lon-from.Lon).Deg())-180) > 1e-9 { // half a turn apart both ways round are equal
			t.Errorf("there %.8f° %.7f NM, back %.8f° %.7f NM", course.Deg(), nm, back.Deg(), same)
		}
	})
}

// An angle a hair below zero must not come out as 360°; nor a longitude a hair
// above -180° as -180°.
func TestRangesAtTheirEdges(t *testing.T) {
	for _, deg := range []float64{0, -1e-300, -1e-17, -1e-15, 360, 720, -360, 359.9999999999999} {
		from := PositionFromDeg(0, 10)
		to := PositionFromDeg(60, 10)
		to.Lon = from.Lon + PositionFromDeg(0, deg).Lon
		for _, s := range []Sailing{Rhumb, GreatCircle} {
			leg := NewLeg(Waypoint{Position: from}, Waypoint{Position: to}, s)
			if _, final := leg.At(leg.DistanceNM); !inCourseRange(leg.Course) || !inCourseRange(final) {
				t.Errorf("%v, %v: courses %v, %v", deg, s, leg.Course.Deg(), final.Deg())
			}
		}
	}
	for _, deg := range []float64{-180, 180, 540, -540, math.Nextafter(-180, 0), math.Nextafter(180, 0), math.Nextafter(-180, -200)} {
		if lon := PositionFromDeg(0, deg).Lon; !inLonRange(lon) {
			t.Errorf("longitude %v comes out as %v", deg, lon.Deg())
		}
	}
	if got := turn(-1e-17); got != 0 {
		t.Errorf("a hair below zero comes out as %v°", got.Deg())
	}
}
