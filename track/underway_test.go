package track

import (
	"math"
	"testing"
	"time"
)

// A ship of a degree an hour along the equator, with five hours at B.
func equatorPassage(t *testing.T) *Passage {
	t.Helper()
	p, err := onEquator(map[int]Timing{1: {Stay: 5 * time.Hour}}, 0, 10, 20, 30).Sail(Orders{Departure: noon, SpeedKn: degreeNM})
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func TestRejoin(t *testing.T) {
	at := func(lat, lon float64) *Position { p := PositionFromDeg(lat, lon); return &p }
	for _, c := range []struct {
		name string
		u    UnderWay
		off  float64
		want string
	}{
		{"late before departure", UnderWay{Late: 6 * time.Hour}, 0, "A-B 60.108 6.000..16.000; at B 16.000..21.000; B-C 60.108 21.000..31.000; C-D 60.108 31.000..41.000"},
		{"late under way", UnderWay{Time: hour(8), Late: 2 * time.Hour}, 0, "-B 60.108 8.000..12.000; at B 12.000..17.000; B-C 60.108 17.000..27.000; C-D 60.108 27.000..37.000"},
		{"late in a stay", UnderWay{Time: hour(14), Late: 2 * time.Hour}, 0, "at B 14.000..17.000; B-C 60.108 17.000..27.000; C-D 60.108 27.000..37.000"},
		{"slower from here", UnderWay{Time: hour(20), SpeedKn: degreeNM / 2}, 0, "-C 30.054 20.000..30.000; C-D 30.054 30.000..50.000"},
		{"history", UnderWay{Time: hour(18), Late: time.Hour, History: true}, 0, "A-B 60.108 0.000..10.000; at B 10.000..15.000; B- 60.108 15.000..18.000; -C 60.108 18.000..26.000; C-D 60.108 26.000..36.000"},
		{"history, nothing past", UnderWay{Time: hour(0), Position: at(0, 0), History: true}, 0, "-B 60.108 0.000..10.000; at B 10.000..15.000; B-C 60.108 15.000..25.000; C-D 60.108 25.000..35.000"},
		// The first degree of latitude is 110574 m (WGS84, memory), the six of
		// longitude are on the mean 0.99996 of those along the equator (cos 0.5°):
		// 365.54 NM by Pythagoras, 6.0814 hours.
		{"from a position on the route", UnderWay{Time: hour(30), Position: at(0, 24)}, 0, "-D 60.108 30.000..36.000"},
		{"from a position north of it", UnderWay{Time: hour(30), Position: at(1, 24)}, 110574.0 / 1852, "-D 60.108 30.000..36.081"},
		{"from a waypoint", UnderWay{Time: hour(30), Position: at(0, 20)}, 0, "-D 60.108 30.000..40.000"},
		{"from before the start", UnderWay{Time: hour(-3), Position: at(0, -2)}, 2 * degreeNM, "-B 60.108 -3.000..9.000; at B 9.000..14.000; B-C 60.108 14.000..24.000; C-D 60.108 24.000..34.000"},
	} {
		t.Run(c.name, func(t *testing.T) {
			p, off, err := equatorPassage(t).Rejoin(c.u)
			if err != nil {
				t.Fatal(err)
			}
			if got := scheduleText(p); got != c.want {
				t.Errorf("schedule %s\nwant     %s", got, c.want)
			}
			if math.Abs(off-c.off) > 0.001 { // NM, what the search by thirds leaves
				t.Errorf("%.4f NM off the route, want %.4f", off, c.off)
			}
		})
	}
}

// With history the ship is where the plan had her until now, and from now on
// where she is.
func TestHistoryKeepsThePlanUntilNow(t *testing.T) {
	plan := equatorPassage(t)
	now, here := hour(18), PositionFromDeg(0.5, 12)
	p, _, err := plan.Rejoin(UnderWay{Time: now, Position: &here, History: true})
	if err != nil {
		t.Fatal(err)
	}
	for h := 0.0; h < 18; h += 0.25 {
		if d := apart(p.At(hour(h)).Position, plan.At(hour(h)).Position); d > 1e-6 { // 2 mm
			t.Errorf("hour %v: %.3g NM from the plan", h, d)
		}
	}
	if d := apart(p.At(now).Position, here); d > 1e-6 {
		t.Errorf("now %.3g NM from where she is", d)
	}
	if d := apart(p.At(p.Arrival).Position, PositionFromDeg(0, 30)); d > 1e-6 {
		t.Errorf("ends %.3g NM from the route's end", d)
	}
}

func TestRejoinRefuses(t *testing.T) {
	north, end := PositionFromDeg(89.95, 0), PositionFromDeg(0, 30)
	for _, c := range []struct {
		name                      string
		u                         UnderWay
		place, met, allowed, hint string
	}{
		{"before departure", UnderWay{Time: hour(-1)}, "time", "2026-11-20 11:00 UTC", "within the passage", "position"},
		{"after arrival", UnderWay{Time: hour(36)}, "time", "2026-11-22 00:00 UTC", "within the passage", "position"},
		{"too fast", UnderWay{Time: hour(3), SpeedKn: 200}, "speed", "200 kn", "at most 100 kn", "--speed"},
		{"at the pole", UnderWay{Time: hour(3), Position: &north}, "position", "latitude 89.95", "ship's time", "short of the pole"},
		{"arrived", UnderWay{Time: hour(3), Position: &end}, "position", "at the end", "on the way", "nothing is left"},
	} {
		t.Run(c.name, func(t *testing.T) {
			p, _, err := equatorPassage(t).Rejoin(c.u)
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
			if p != nil {
				t.Error("a passage came with the error")
			}
		})
	}
}
