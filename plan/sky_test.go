package plan

import (
	"math/rand/v2"
	"testing"
	"time"

	"gloam/astro"
	"gloam/track"
)

// On passages of all sorts, to 100 knots and to 89.8° of latitude, over a pole
// too, and with a stay before departure, every change of sign that a scan in steps of 20 s sees is found, in its
// step; what the search finds beyond are pairs between two steps.
func TestSearchFindsWhatAScanSees(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 22))
	seen, beyond := 0, 0
	for range 60 {
		lat := func() float64 { return 89.8 * (2*rng.Float64() - 1) }
		r := &track.Route{}
		for range 2 {
			r.Waypoints = append(r.Waypoints, track.Waypoint{Position: track.PositionFromDeg(lat(), 360*rng.Float64())})
		}
		r.Waypoints[0].Stay = time.Duration(rng.IntN(12)) * time.Hour
		start := time.Date(2026, 1, 1, 0, 0, 0, 0, time.UTC).Add(time.Duration(rng.IntN(4*365*24)) * time.Hour)
		p, err := r.Sail(track.Orders{Departure: start, SpeedKn: 20 + 80*rng.Float64(), Sailing: new(track.Sailing(rng.IntN(2)))})
		if err != nil {
			t.Fatal(err)
		}
		start = p.Departure
		p.Arrival = earlierOf(p.Arrival, start.Add(36*time.Hour))
		s := newSky(p, astro.DeltaT)
		functions := []func(time.Time) float64{s.above(astro.Moon, moonriseAltitude), s.transit}
		for _, e := range sunEvents {
			functions = append(functions, s.above(astro.Sun, fixed(e.level)))
		}
		for _, f := range functions {
			found := s.crossings(f)
			const step = 20 * time.Second
			last, k, before := f(start), 0, start
			for at := start.Add(step); at.Before(p.Arrival); at = at.Add(step) {
				now := f(at)
				n := 0
				for ; k < len(found) && !found[k].time.After(at); k++ {
					n++
				}
				changed := (now >= 0) != (last >= 0)
				if changed {
					seen++
				}
				if n > 1 {
					beyond += n / 2
				}
				if (n%2 == 1) != changed {
					t.Errorf("%v to %v at %.0f kn: %d crossings found between %v and %v, sign changed: %v",
						p.Legs[0].From, p.Legs[0].To, p.Legs[0].SpeedKn, n, before, at, changed)
				}
				last, before = now, at
			}
		}
	}
	if seen < 300 {
		t.Errorf("%d changes of sign, want 300 or more for this test to mean something", seen)
	}
	t.Logf("%d changes of sign, %d pairs between steps", seen, beyond)
}
