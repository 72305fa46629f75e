package track

import (
	"os"
	"path/filepath"
	"testing"
	"time"
)

// referenceRoutes are the routes of plan/testdata/voyages, whose README tells
// where they come from.
func referenceRoutes(t *testing.T) map[string]*Route {
	t.Helper()
	files, err := filepath.Glob("../plan/testdata/voyages/*.geojson")
	if err != nil || len(files) != 6 {
		t.Fatalf("%d routes, %v; want 6", len(files), err)
	}
	routes := map[string]*Route{}
	for _, name := range files {
		f, err := os.Open(name)
		if err != nil {
			t.Fatal(err)
		}
		r, err := ReadGeoJSON(f)
		f.Close()
		if err != nil {
			t.Fatal(err)
		}
		routes[filepath.Base(name)] = r
	}
	return routes
}

// stepper walks a route minute by minute, without the passage's arithmetic: it
// uses up miles of the leg, then hours of the stay, then miles of the next.
type stepper struct {
	legs  []Leg
	stays []float64 // hours at the end of each leg
	leg   int
	miles float64
	lain  float64
}

func (s *stepper) step(speedKn, hours float64) Position {
	for hours > 1e-15 && s.leg < len(s.legs) {
		l := &s.legs[s.leg]
		if left := l.DistanceNM - s.miles; left > 0 {
			run := min(hours, left/speedKn)
			if s.miles += run * speedKn; run < hours {
				s.miles = l.DistanceNM
			}
			hours -= run
			continue
		}
		lie := min(hours, s.stays[s.leg]-s.lain)
		hours, s.lain = hours-lie, s.lain+lie
		if s.lain >= s.stays[s.leg]-1e-12 && s.leg+1 < len(s.legs) {
			s.leg, s.miles, s.lain = s.leg+1, 0, 0
		} else if lie == 0 {
			break
		}
	}
	at, _ := s.legs[s.leg].At(s.miles)
	return at
}

// Stays added to the reference voyages, the ship is where stepping puts her.
// 1e-6 NM is 2 mm: the stepper's rounding over some 30,000 steps.
func TestStaysByStepping(t *testing.T) {
	const speed = 11.0
	for name, r := range referenceRoutes(t) {
		s := &stepper{}
		for i := range r.Waypoints {
			r.Waypoints[i].Timing = Timing{}
			if i == 0 {
				continue
			}
			hours := float64(7*i%5) * 5.25 // some none, some over a day
			r.Waypoints[i].Stay = hoursToDuration(hours)
			s.legs = append(s.legs, NewLeg(r.Waypoints[i-1], r.Waypoints[i], GreatCircle))
			s.stays = append(s.stays, hours)
		}
		circle := GreatCircle
		p, err := r.Sail(Orders{Departure: noon, SpeedKn: speed, Sailing: &circle})
		if err != nil {
			t.Fatal(err)
		}
		worst, lain := 0.0, 0
		for at := noon.Add(time.Minute); at.Before(p.Arrival); at = at.Add(time.Minute) {
			fix := p.At(at)
			worst = max(worst, apart(fix.Position, s.step(speed, 1.0/60)))
			if fix.SpeedKn == 0 {
				lain++
			}
		}
		t.Logf("%s: %d minutes lain still, worst %.2g NM", name, lain, worst)
		if worst > 1e-6 || lain == 0 {
			t.Errorf("%s: %.3g NM from where stepping puts her, %d minutes lain still", name, worst, lain)
		}
	}
}
