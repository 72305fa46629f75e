package track

import (
	"fmt"
	"math"
	"strings"
	"testing"
	"time"
)

func hour(h float64) time.Time { return noon.Add(hoursToDuration(h)) }

// onEquator is a route along the equator, one leg for each longitude after the
// first; a degree is 6378137 π/180/1852 = 60.1078 NM (WGS84).
func onEquator(timings map[int]Timing, lon ...float64) *Route {
	r := &Route{}
	for i, l := range lon {
		r.Waypoints = append(r.Waypoints, Waypoint{Name: string(rune('A' + i)), Position: PositionFromDeg(0, l), Timing: timings[i]})
	}
	return r
}

const degreeNM = 6378137 * math.Pi / 180 / 1852

// scheduleText writes each leg as "from-to knots hours..hours" after noon, and
// a stay as "at A hours..hours".
func scheduleText(p *Passage) string {
	var all []string
	for _, l := range p.Legs {
		span := fmt.Sprintf("%.3f..%.3f", l.ETD.Sub(noon).Hours(), l.ETA.Sub(noon).Hours())
		if l.Stays() {
			all = append(all, "at "+l.To.Name+" "+span)
			continue
		}
		all = append(all, fmt.Sprintf("%s-%s %.3f %s", l.From.Name, l.To.Name, l.SpeedKn, span))
	}
	return strings.Join(all, "; ")
}

// Speeds are in multiples of a degree an hour, so that the hours are those of
// mental arithmetic: speed is way by time.
func TestSchedules(t *testing.T) {
	one, circle := degreeNM, GreatCircle
	for _, c := range []struct {
		name    string
		route   *Route
		speedKn float64
		orders  Orders
		want    string
	}{
		{"departure and speed", onEquator(nil, 0, 1, 3), one / 2, Orders{Departure: noon}, "A-B 30.054 0.000..2.000; B-C 30.054 2.000..6.000"},
		{"departure and arrival", onEquator(map[int]Timing{0: {ETD: noon}, 2: {ETA: hour(4)}}, 0, 1, 4), 0, Orders{}, "A-B 60.108 0.000..1.000; B-C 60.108 1.000..4.000"},
		{"arrival and speed", onEquator(map[int]Timing{2: {ETA: hour(4)}}, 0, 1, 2), one / 2, Orders{}, "A-B 30.054 0.000..2.000; B-C 30.054 2.000..4.000"},
		{"times at some waypoints", onEquator(map[int]Timing{0: {ETA: noon}, 2: {ETA: hour(8)}, 3: {ETA: hour(9)}}, 0, 1, 2, 3), 0, Orders{},
			"A-B 15.027 0.000..4.000; B-C 15.027 4.000..8.000; C-D 60.108 8.000..9.000"},
		{"a speed of its own between times", onEquator(map[int]Timing{0: {ETA: noon}, 1: {SpeedKn: one}, 2: {ETA: hour(5)}}, 0, 1, 3), 0, Orders{},
			"A-B 60.108 0.000..1.000; B-C 30.054 1.000..5.000"},
		{"a stay", onEquator(map[int]Timing{1: {Stay: 3 * time.Hour}}, 0, 1, 2), one, Orders{Departure: noon}, "A-B 60.108 0.000..1.000; at B 1.000..4.000; B-C 60.108 4.000..5.000"},
		{"a stay between times", onEquator(map[int]Timing{0: {ETD: noon}, 1: {Stay: 3 * time.Hour}, 2: {ETA: hour(7)}}, 0, 1, 2), 0, Orders{},
			"A-B 30.054 0.000..2.000; at B 2.000..5.000; B-C 30.054 5.000..7.000"},
		{"a stay by two times", onEquator(map[int]Timing{1: {ETA: hour(2), ETD: hour(12)}}, 0, 1, 2), one, Orders{}, "A-B 60.108 1.000..2.000; at B 2.000..12.000; B-C 60.108 12.000..13.000"},
		{"stays at the ends", onEquator(map[int]Timing{0: {ETA: hour(-5), ETD: noon}, 1: {Stay: 2 * time.Hour}}, 0, 1), one, Orders{}, "at A -5.000..0.000; A-B 60.108 0.000..1.000; at B 1.000..3.000"},
		{"times win over a speed rounded", onEquator(map[int]Timing{0: {ETD: noon}, 2: {ETA: hour(4)}}, 0, 1, 2), 30, Orders{}, "A-B 30.054 0.000..2.000; B-C 30.054 2.000..4.000"},

		{"order: departure moves the schedule", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(1), ETD: hour(3)}, 2: {ETA: hour(5)}}, 0, 1, 2), 0, Orders{Departure: hour(10)},
			"A-B 60.108 10.000..11.000; at B 11.000..13.000; B-C 30.054 13.000..15.000"},
		{"order: speed leaves the stay", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(1), ETD: hour(3), SpeedKn: one}, 2: {ETA: hour(5)}}, 0, 1, 2), 0, Orders{SpeedKn: one / 4},
			"A-B 15.027 0.000..4.000; at B 4.000..6.000; B-C 15.027 6.000..10.000"},
		{"order: arrival", onEquator(map[int]Timing{0: {ETD: noon}, 1: {SpeedKn: one}}, 0, 1, 2), 9, Orders{Arrival: hour(4)}, "A-B 30.054 0.000..2.000; B-C 30.054 2.000..4.000"},
		{"order: arrival and speed", onEquator(nil, 0, 1, 2), 9, Orders{Arrival: hour(4), SpeedKn: one}, "A-B 60.108 2.000..3.000; B-C 60.108 3.000..4.000"},
		{"sailing of one leg", onEquator(map[int]Timing{2: {Sailing: &circle}}, 0, 1, 2), one, Orders{Departure: noon}, "A-B 60.108 0.000..1.000; B-C 60.108 1.000..2.000"},
	} {
		t.Run(c.name, func(t *testing.T) {
			c.route.SpeedKn = c.speedKn
			p, err := c.route.Sail(c.orders)
			if err != nil {
				t.Fatal(err)
			}
			if got := scheduleText(p); got != c.want {
				t.Errorf("schedule %s\nwant     %s", got, c.want)
			}
		})
	}
}

func TestSailingsOfLegs(t *testing.T) {
	circle, rhumb := GreatCircle, Rhumb
	r := onEquator(map[int]Timing{1: {Sailing: &circle}, 2: {Sailing: &rhumb}}, 0, 1, 2, 3)
	for _, c := range []struct {
		whole, order *Sailing
		want         string
	}{
		{nil, nil, "[great-circle rhumb rhumb]"},
		{&circle, nil, "[great-circle rhumb great-circle]"},
		{&circle, &rhumb, "[rhumb rhumb rhumb]"},
	} {
		r.Sailing = c.whole
		p, err := r.Sail(Orders{Departure: noon, SpeedKn: 5, Sailing: c.order})
		if err != nil {
			t.Fatal(err)
		}
		var got []Sailing
		for _, l := range p.Legs {
			got = append(got, l.Sailing)
		}
		if fmt.Sprint(got) != c.want {
			t.Errorf("sailings %v, want %s", got, c.want)
		}
	}
}

func TestSchedulesRefused(t *testing.T) {
	one := degreeNM
	for _, c := range []struct {
		name                      string
		route                     *Route
		speedKn                   float64
		place, met, allowed, hint string
	}{
		{"no departure", onEquator(nil, 0, 1), 10, "departure", "missing", "RFC 3339", "--depart"},
		{"no speed", onEquator(map[int]Timing{0: {ETD: noon}}, 0, 1), 0, "speed", "missing", "knots", "--speed or --arrive"},
		{"no speed on one leg", onEquator(map[int]Timing{0: {ETD: noon}, 1: {SpeedKn: 5}}, 0, 1, 2), 0, "speed", "missing on the leg to waypoint 3 (C)", "knots", "--speed"},
		{"arrival before departure", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(-1)}}, 0, 1), 0, "waypoint 2 (B)",
			"reached 2026-11-20 11:00 UTC, when waypoint 1 (A) is left 2026-11-20 12:00 UTC", "in order", "mend"},
		{"left before it is reached", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(3), ETD: hour(2)}}, 0, 1, 2), 9, "waypoint 2 (B)", "left 2026-11-20 14:00 UTC, before it is reached 2026-11-20 15:00 UTC", "in order", "mend"},
		{"times and speed disagree", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(2)}}, 0, 1), one, "waypoint 2 (B)",
			"reached 2026-11-20 14:00 UTC by its time, 2026-11-20 13:00 UTC by the speeds", "within a minute or 0.1 kn", "mend"},
		{"stay and times disagree", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(2), ETD: hour(4), Stay: 5 * time.Hour}}, 0, 1, 2), 0, "waypoint 2 (B)", "a stay of 5h0m0s, and of 2h0m0s", "agree", "mend"},
		{"too fast", onEquator(map[int]Timing{0: {ETD: noon}, 1: {ETA: hour(0.5)}}, 0, 1), 0, "waypoint 2 (B)", "60.1 NM left for 0.5 h", "at most 100 kn", "mend"},
		{"no time left", onEquator(map[int]Timing{0: {ETD: noon}, 1: {SpeedKn: one / 4}, 2: {ETA: hour(3)}}, 0, 1, 2), 0, "waypoint 3 (C)",
			"reached 2026-11-20 15:00 UTC by its time, not before 2026-11-20 16:00 UTC", "agree", "mend"},
		{"stays leave no time", onEquator(map[int]Timing{0: {ETD: noon}, 1: {Stay: 9 * time.Hour}, 2: {ETA: hour(3)}}, 0, 1, 2), one, "waypoint 3 (C)", "reached 2026-11-20 15:00 UTC by its time", "agree", "mend"},
		{"a speed past the limit", onEquator(map[int]Timing{1: {SpeedKn: 101}}, 0, 1), 0, "waypoint 2 (B)", "101 kn", "at most 100 kn", "knots"},
		{"a stay below zero", onEquator(map[int]Timing{1: {Stay: -1}}, 0, 1), 5, "waypoint 2 (B)", "a stay of -1ns", "0 or more", "mend"},
		{"before the years served", onEquator(map[int]Timing{0: {ETD: Earliest.Add(-time.Hour)}}, 0, 1), 5, "waypoint 1 (A)", "1989-12-31T23:00:00Z", "1990 to 2100", "year"},
	} {
		t.Run(c.name, func(t *testing.T) {
			c.route.SpeedKn = c.speedKn
			p, err := c.route.Sail(Orders{})
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
			if p != nil {
				t.Error("a passage came with the error")
			}
		})
	}
}
