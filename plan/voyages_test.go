package plan

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"
	"time"

	"gloam/astro"
	"gloam/track"
)

// voyage is one of the passages of testdata/voyages, with all its events as
// found by other programs; see testdata/README.md.
type voyage struct {
	name    string
	passage *track.Passage
	events  []Event
	arrival time.Time
}

func readCSV(t testing.TB, file string) [][]string {
	t.Helper()
	f, err := os.Open("testdata/voyages/" + file)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	return rows[1:]
}

func number(t testing.TB, text string) float64 {
	t.Helper()
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

func instant(t testing.TB, text string) time.Time {
	t.Helper()
	at, err := time.Parse(time.RFC3339Nano, text)
	if err != nil {
		t.Fatal(err)
	}
	return at
}

func readVoyages(t testing.TB) []voyage {
	t.Helper()
	var all []voyage
	for _, row := range readCSV(t, "voyages.csv") {
		f, err := os.Open("testdata/voyages/" + row[0] + ".geojson")
		if err != nil {
			t.Fatal(err)
		}
		route, err := track.ReadGeoJSON(f)
		f.Close()
		if err != nil {
			t.Fatal(err)
		}
		how, err := track.ParseSailing(row[3])
		if err != nil {
			t.Fatal(err)
		}
		p, err := route.Sail(track.Orders{Departure: instant(t, row[1]), SpeedKn: number(t, row[2]), Sailing: &how})
		if err != nil {
			t.Fatal(err)
		}
		v := voyage{name: row[0], passage: p, arrival: instant(t, row[5])}
		for _, e := range readCSV(t, row[0]+".events.csv") {
			v.events = append(v.events, Event{EventKind(e[0]), instant(t, e[1]), track.PositionFromDeg(number(t, e[2]), number(t, e[3]))})
		}
		all = append(all, v)
	}
	return all
}

// Tolerances against the voyages: half a second, 0.1' of the Sun's motion, and
// 3 s for the Moon, whose rising can be slow. The position follows.
const (
	sunTolerance   = 500 * time.Millisecond
	moonTolerance  = 3 * time.Second
	placeTolerance = 0.05 // NM
)

func tolerance(k EventKind) time.Duration {
	if strings.HasPrefix(string(k), "moon") {
		return moonTolerance
	}
	return sunTolerance
}

// Source: Swiss Ephemeris and GeographicLib by brute force; see
// testdata/README.md.
func TestEventsOfSixVoyages(t *testing.T) {
	var worstSun, worstMoon time.Duration
	var worstNM float64
	total := 0
	for _, v := range readVoyages(t) {
		if d := v.passage.Arrival.Sub(v.arrival).Abs(); d > time.Second {
			t.Errorf("%s: arrival off by %v", v.name, d)
		}
		got := newSky(v.passage, astro.DeltaT).events()
		if len(got) != len(v.events) {
			t.Errorf("%s: %d events, want %d", v.name, len(got), len(v.events))
			continue
		}
		total += len(got)
		for i, want := range v.events {
			late := got[i].Time.Sub(want.Time).Abs()
			nm := milesApart(got[i].Position, want.Position)
			if got[i].Kind != want.Kind || late > tolerance(want.Kind) || nm > placeTolerance {
				t.Errorf("%s: %v, want %v: %v and %.3f NM apart", v.name, got[i], want, late, nm)
			}
			worstNM = math.Max(worstNM, nm)
			if tolerance(want.Kind) == moonTolerance {
				worstMoon = max(worstMoon, late)
			} else {
				worstSun = max(worstSun, late)
			}
		}
	}
	t.Logf("%d events: Sun within %v, Moon within %v, DR within %.4f NM", total, worstSun, worstMoon, worstNM)
}

func milesApart(a, b track.Position) float64 {
	return track.NewLeg(track.Waypoint{Position: a}, track.Waypoint{Position: b}, track.GreatCircle).DistanceNM
}
