package track

import (
	"math"
	"testing"
	"time"
)

var noon = time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)

// sail makes a passage through places given as latitude, longitude pairs in
// degrees.
func sail(t testing.TB, departure time.Time, speedKn float64, s Sailing, deg ...float64) *Passage {
	t.Helper()
	p, err := route(deg...).Sail(Orders{Departure: departure, SpeedKn: speedKn, Sailing: &s})
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func route(deg ...float64) *Route {
	r := &Route{Name: "Test"}
	for i := 0; i+1 < len(deg); i += 2 {
		r.Waypoints = append(r.Waypoints, Waypoint{Position: PositionFromDeg(deg[i], deg[i+1])})
	}
	return r
}

// apart is the geodesic distance between two places in NM.
func apart(a, b Position) float64 {
	return NewLeg(Waypoint{Position: a}, Waypoint{Position: b}, GreatCircle).DistanceNM
}

func TestSailRefuses(t *testing.T) {
	mile, world := []float64{0, 0, 0, 1}, []float64{0, 0, 0, 120, 0, -120, 0, 0}
	for _, c := range []struct {
		name                      string
		places                    []float64
		departure                 time.Time
		speed                     float64
		place, met, allowed, hint string
	}{
		{"too early", mile, Earliest.Add(-1), 10, "departure", "1989-12-31T23:59:59Z", "1990 to 2100", "year"},
		{"too late", mile, Latest, 10, "departure", "2101-01-01T00:00:00Z", "1990 to 2100", "year"},
		{"no departure", mile, time.Time{}, 10, "departure", "missing", "RFC 3339", "--depart"},
		{"no speed", mile, noon, 0, "speed", "missing", "knots", "--speed"},
		{"astern", mile, noon, -5, "speed", "-5 kn", "above 0, at most 100 kn", "--speed"},
		{"too fast", mile, noon, 100.5, "speed", "100.5 kn", "above 0, at most 100 kn", "--speed"},
		{"speed not a number", mile, noon, math.NaN(), "speed", "NaN kn", "above 0, at most 100 kn", "--speed"},
		{"speed infinite", mile, noon, math.Inf(1), "speed", "Inf kn", "above 0, at most 100 kn", "--speed"},
		{"past the end", mile, Latest.Add(-1), 10, "arrival", "2101-01-01T06:00", "1990 to 2100", "year"},
		{"too long", world, noon, 2.2, "passage", "21639 NM take 409.8 days", "at most 400 days", "raise the speed"},
		{"endless", world, noon, 1e-300, "passage", "21639 NM take 2400 days", "at most 400 days", "raise the speed"},
		{"no waypoint", nil, noon, 10, "route", "0 waypoint(s)", "two or more", "departure to arrival"},
		{"one waypoint", []float64{0, 0}, noon, 10, "route", "1 waypoint(s)", "two or more", "departure to arrival"},
	} {
		t.Run(c.name, func(t *testing.T) {
			p, err := route(c.places...).Sail(Orders{Departure: c.departure, SpeedKn: c.speed})
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
			if p != nil {
				t.Error("a passage came with the error")
			}
		})
	}
}

func TestSailAtItsLimits(t *testing.T) {
	sail(t, Earliest, MaxSpeedKn, Rhumb, 0, 0, 0, 1)
	sail(t, Latest.Add(-time.Hour), MaxSpeedKn, GreatCircle, 0, 0, 0, 1)
	p := sail(t, noon.In(time.FixedZone("", 3600)), 2.26, Rhumb, 0, 0, 0, 120, 0, -120, 0, 0)
	if p.Departure != noon {
		t.Errorf("departure %v, want %v", p.Departure, noon)
	}
	if days := p.Arrival.Sub(p.Departure).Hours() / 24; days < 398 || days > 400 {
		t.Errorf("%v days under way, want close to the 400 allowed", days)
	}
}

// At stands still before departure and after arrival, and passes each waypoint
// at its ETD, there already on the leg that begins. 1e-6 NM is 2 mm: 100 kn
// for the nanosecond of rounding is far less, the rest is that of angles.
func TestAtWaypoints(t *testing.T) {
	places := []float64{50, -5, 48, -12, 38.5, -28, 38, -31, 32, -64, 32.5, -64.1}
	for _, s := range []Sailing{Rhumb, GreatCircle} {
		for speed := 0.7; speed <= MaxSpeedKn; speed *= 1.31 {
			p := sail(t, noon.Add(987654321), speed, s, places...)
			if p.Legs[0].ETD != p.Departure || p.Legs[len(p.Legs)-1].ETA != p.Arrival {
				t.Fatalf("%v: begins %v, ends %v", s, p.Legs[0].ETD, p.Legs[len(p.Legs)-1].ETA)
			}
			for i := range p.Legs {
				fix := p.At(p.Legs[i].ETD)
				if fix.Leg != i || fix.SpeedKn != speed || apart(fix.Position, p.Legs[i].From.Position) > 1e-6 ||
					math.Abs(wrap(fix.Course-p.Legs[i].Course).Deg()) > 1e-6 {
					t.Errorf("%v %.2f kn: at waypoint %d leg %d, course %.6f°, %v", s, speed, i, fix.Leg, fix.Course.Deg(), fix.Position)
				}
				// A hundredth of a second before, the ship is on the leg that ends.
				if before := p.At(p.Legs[i].ETD.Add(-10 * time.Millisecond)); i > 0 && before.Leg != i-1 {
					t.Errorf("%v %.2f kn: before waypoint %d on leg %d", s, speed, i, before.Leg)
				}
			}
			last := len(p.Legs) - 1
			for _, late := range []time.Duration{0, time.Nanosecond, 1000 * time.Hour} {
				if fix := p.At(p.Departure.Add(-late)); fix != p.At(p.Departure) || fix.Leg != 0 {
					t.Errorf("%v %.2f kn: %v before departure at %v, leg %d", s, speed, late, fix.Position, fix.Leg)
				}
				fix := p.At(p.Arrival.Add(late))
				if fix.Leg != last || apart(fix.Position, p.Legs[last].To.Position) > 1e-6 {
					t.Errorf("%v %.2f kn: %v after arrival at %v, leg %d", s, speed, late, fix.Position, fix.Leg)
				}
			}
		}
	}
}

// In an hour the ship makes good its speed, along the leg. 1e-6 NM is 2 mm,
// the accuracy of the rhumb line over short ways.
func TestSpeedOfAdvance(t *testing.T) {
	for _, s := range []Sailing{Rhumb, GreatCircle} {
		p := sail(t, noon, 15, s, 50, 170, 20, -140)
		for h := 0; h < int(p.DistanceNM/15); h++ {
			a, b := p.At(noon.Add(time.Duration(h)*time.Hour)), p.At(noon.Add(time.Duration(h+1)*time.Hour))
			hour := NewLeg(Waypoint{Position: a.Position}, Waypoint{Position: b.Position}, s)
			if math.Abs(hour.DistanceNM-15) > 1e-6 {
				t.Errorf("%v hour %d: %.8f NM, want 15", s, h, hour.DistanceNM)
			}
			// 2 mm in 15 NM are 4e-6° of course.
			if math.Abs(wrap(hour.Course-a.Course).Deg()) > 4e-6 {
				t.Errorf("%v hour %d: course %.7f°, want %.7f°", s, h, a.Course.Deg(), hour.Course.Deg())
			}
		}
	}
}

// No jump at a waypoint: a second either side of it lies within two seconds'
// sailing, 1e-6 NM (2 mm) allowed for rounding.
func TestLegsJoin(t *testing.T) {
	for _, s := range []Sailing{Rhumb, GreatCircle} {
		p := sail(t, noon, 18, s, -10, 160, -12, 179, -5, -178, 20, -178, 20, 178, 21, 175)
		for i := 1; i < len(p.Legs); i++ {
			at := p.Legs[i].ETD
			if d := apart(p.At(at.Add(-time.Second)).Position, p.At(at.Add(time.Second)).Position); d > 2*18.0/3600+1e-6 {
				t.Errorf("%v waypoint %d: %.6f NM in two seconds", s, i, d)
			}
		}
	}
}

// A nautical mile is 1852 m. Source: lengths in metres on WGS84, equator from
// its radius 6378137 m, meridian quadrant 10001965.729 and equator to 45°
// 4984944.378 (memory). 1e-6 NM is 2 mm, the last figures given.
func TestNauticalMile(t *testing.T) {
	for _, c := range []struct {
		lat1, lon1, lat2, lon2, metres float64
	}{
		{0, 0, 0, 1, 6378137 * math.Pi / 180},
		{0, 0, 45, 0, 4984944.378},
		{45, 0, 0, 0, 4984944.378},
		{0, 0, 90, 0, 10001965.729},
	} {
		for _, s := range []Sailing{Rhumb, GreatCircle} {
			from, to := Waypoint{Position: PositionFromDeg(c.lat1, c.lon1)}, Waypoint{Position: PositionFromDeg(c.lat2, c.lon2)}
			if got, want := NewLeg(from, to, s).DistanceNM, c.metres/1852; math.Abs(got-want) > 1e-6 {
				t.Errorf("%v %v: %.7f NM, want %.7f", c, s, got, want)
			}
		}
	}
}
