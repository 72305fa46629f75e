package track

import (
	"math"
	"testing"

	"github.com/soniakeys/unit"
)

// Worked examples take 1' of latitude as one mile and other spheroids, or the
// sphere: distances differ from WGS84 by up to 0.5 %. Meridional parts of
// Clarke 1880 and WGS84 differ by 0.3' at most, which is 0.01° of these
// courses; sphere against ellipsoid is 0.2°.
var printedSailings = []struct {
	source   string
	from, to [2]float64 // latitude, longitude in degrees
	sailing  Sailing
	course   float64 // degrees
	within   float64 // degrees
	nm       float64
	exact    float64 // NM on WGS84 (calc, a regression value), 0 if none
}{
	// marinegyaan.com, Exercise 3 (the page prints the first course W, a slip).
	{"Exercise 3 q1", [2]float64{24, -74.25}, [2]float64{46, -53.75}, Rhumb, 37 + 8.23/60, 0.01, 1655.81, 1653.16},
	{"Exercise 3 q2", [2]float64{6, -79}, [2]float64{-38, 179}, Rhumb, 180 + 65 + 19.31/60, 0.01, 6323.03, 6298.85},
	{"Exercise 3 q3", [2]float64{40.3, -100 - 20.0/60}, [2]float64{68, 140 + 10.0/60}, Rhumb, 360 - 67 - 26.7/60, 0.01, 4332.97, 4339.89},
	// The American Practical Navigator, Pub. No. 9, "The Sailings" (memory).
	{"mid-latitude", [2]float64{-8 - 48.9/60, -89 - 53.3/60}, [2]float64{-17 - 6.9/60, -104 - 51.6/60}, Rhumb, 240.4, 0.2, 1007.1, 0},
	{"great circle", [2]float64{12 + 45.2/60, 124 + 20.1/60}, [2]float64{33 + 48.8/60, -120 - 7.1/60}, GreatCircle, 50.3, 0.2, 6185.8, 0},
}

func TestPrintedSailings(t *testing.T) {
	for _, c := range printedSailings {
		leg := NewLeg(Waypoint{Position: PositionFromDeg(c.from[0], c.from[1])},
			Waypoint{Position: PositionFromDeg(c.to[0], c.to[1])}, c.sailing)
		if off := wrapDeg(leg.Course.Deg() - c.course); math.Abs(off) > c.within {
			t.Errorf("%s: course %.4f°, want %.4f°", c.source, leg.Course.Deg(), c.course)
		}
		if off := leg.DistanceNM/c.nm - 1; math.Abs(off) > 0.005 {
			t.Errorf("%s: %.2f NM, want %.2f within 0.5 %%", c.source, leg.DistanceNM, c.nm)
		}
		if c.exact > 0 && math.Abs(leg.DistanceNM-c.exact) > 0.006 { // half of the last figure given
			t.Errorf("%s: %.3f NM, want %.2f", c.source, leg.DistanceNM, c.exact)
		}
	}
}

// Where a course leads. Source: marinegyaan.com, Exercise 3, second page. The
// 0.4 % by which its mile differs makes 4' of 920' and 16' of 3965' of latitude,
// and with them 10' of 2479' of longitude.
func TestPrintedForwardSailings(t *testing.T) {
	start := PositionFromDeg(36.8, -85-53.0/60)
	end := rhumbDirect(start, unit.AngleFromDeg(241), 1897)
	if want := 21 + 28.3/60; math.Abs(end.Lat.Deg()-want) > 4.0/60 {
		t.Errorf("latitude %v°, want %v°", end.Lat.Deg(), want)
	}
	start = PositionFromDeg(-6-10.0/60, -176-47.0/60)
	end = rhumbDirect(start, unit.AngleFromDeg(333), 4450)
	if lat, lon := 59+55.0/60, 141+54.1/60; math.Abs(end.Lat.Deg()-lat) > 16.0/60 || math.Abs(end.Lon.Deg()-lon) > 10.0/60 {
		t.Errorf("place %v° %v°, want %v° %v°", end.Lat.Deg(), end.Lon.Deg(), lat, lon)
	}
}

// Half round the equator the geodesic leaves it; a latitude of minus nothing,
// as "-0.0" in a file, must not upset it. Source: GeographicLib GeodSolve,
// Debian package geographiclib-tools, 2.1.2, in metres to 1e-6; 1e-8 NM is 2e-5 m.
func TestAlongTheEquator(t *testing.T) {
	for _, c := range []struct{ lon, metres float64 }{{0.5, 19980861.908891}, {0.1, 20003008.421509}} {
		for _, lat := range []float64{0, math.Copysign(0, -1), -1e-18, 1e-18, -1e-13} {
			leg := NewLeg(Waypoint{Position: PositionFromDeg(lat, 180)}, Waypoint{Position: PositionFromDeg(lat, c.lon)}, GreatCircle)
			if want := c.metres / 1852; math.Abs(leg.DistanceNM-want) > 1e-8 {
				t.Errorf("latitude %v to %v E: %.8f NM, want %.8f", lat, c.lon, leg.DistanceNM, want)
			}
		}
	}
}

func TestSailingNames(t *testing.T) {
	for _, s := range []Sailing{Rhumb, GreatCircle} {
		if got, err := ParseSailing(s.String()); err != nil || got != s {
			t.Errorf("ParseSailing(%q) = %v, %v", s, got, err)
		}
	}
	for _, name := range []string{"", "direct", "Rhumb", "great circle"} {
		if got, err := ParseSailing(name); err == nil {
			t.Errorf("ParseSailing(%q) = %v, want an error", name, got)
		}
	}
}

// A waypoint without a name is called by its position.
func TestWaypointLabel(t *testing.T) {
	w := Waypoint{Position: PositionFromDeg(49.2066, -12.5)}
	if got, want := w.Label(), "49° 12.4' N 012° 30.0' W"; got != want {
		t.Errorf("label %q, want %q", got, want)
	}
	if w.Name = "Horta"; w.Label() != "Horta" {
		t.Errorf("label %q, want its name", w.Label())
	}
}
