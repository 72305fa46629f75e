package plan

import (
	"math"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// hovering is a passage that stays within a mile of a place for some days.
func hovering(tb testing.TB, lat, lon float64, departure string, days float64) *track.Passage {
	tb.Helper()
	r := &track.Route{Name: "Hovering", Waypoints: []track.Waypoint{
		{Position: track.PositionFromDeg(lat, lon)}, {Position: track.PositionFromDeg(lat+1.0/60, lon)},
	}}
	nm := track.NewLeg(r.Waypoints[0], r.Waypoints[1], track.Rhumb).DistanceNM
	p, err := r.Sail(track.Orders{Departure: instant(tb, departure), SpeedKn: nm / (days * 24)})
	if err != nil {
		tb.Fatal(err)
	}
	return p
}

func planOf(tb testing.TB, p *track.Passage, set Settings) *Plan {
	tb.Helper()
	made, err := New(p, set)
	if err != nil {
		tb.Fatal(err)
	}
	return made
}

// The kinds follow from latitude and declination: at 58° N in June the Sun's
// lowest is 58 + 23.4 - 90 = -8.6°; at 78° N in December its highest is
// 90 - 78 - 23.4 = -11.4°.
func TestWindowKinds(t *testing.T) {
	for _, c := range []struct {
		name      string
		lat       float64
		departure string
		days      float64
		want      string // kinds in order
	}{
		{"temperate", 40, "2026-11-20T12:00:00Z", 2, "evening morning evening morning"},
		{"white nights", 58, "2026-06-20T12:00:00Z", 2, "midnight midnight"},
		{"dark noons", 78, "2026-12-20T00:00:00Z", 2, "midday midday"},
		{"polar day", 78, "2026-06-20T00:00:00Z", 2, ""},
		{"polar night", 85, "2026-12-20T00:00:00Z", 2, ""},
		{"from the middle of the evening", 40, "2026-11-20T17:00:00Z", 0.2, "evening"},
		{"into the middle of the morning", 40, "2026-11-20T22:00:00Z", 0.333, "morning"},
		{"from past midnight of a white night", 58, "2026-06-21T00:30:00Z", 0.5, "morning"},
	} {
		var got []string
		for _, w := range planOf(t, hovering(t, c.lat, 0, c.departure, c.days), DefaultSettings()).Windows() {
			got = append(got, strings.TrimSuffix(string(w.Kind), "-stars"))
		}
		if strings.Join(got, " ") != c.want {
			t.Errorf("%s: %v, want %s", c.name, got, c.want)
		}
	}
}

// Windows begin, end and are best where the Sun stands at the altitudes they
// promise: to 0.001', the precision of a root (1 ms) many times over.
func TestWindowLimits(t *testing.T) {
	set := DefaultSettings()
	set.UpperSun, set.LowerSun = unit.AngleFromDeg(-5), unit.AngleFromDeg(-10)
	for _, v := range readVoyages(t) {
		s := newSky(v.passage, astro.DeltaT)
		for _, w := range planOf(t, v.passage, set).Windows() {
			cut := false
			for _, at := range []time.Time{w.Begin, w.End} {
				h := s.altitude(astro.Sun, at)
				near := math.Min(math.Abs((h - set.UpperSun).Min()), math.Abs((h - set.LowerSun).Min()))
				if at.Equal(v.passage.Departure) || at.Equal(v.passage.Arrival) {
					cut = true
				} else if near > 0.001 {
					t.Errorf("%s %s: Sun at %.4f° at an end", v.name, w.ID, h.Deg())
				}
			}
			if d := (s.altitude(astro.Sun, w.Best) - bestSun).Min(); math.Abs(d) > 0.001 && w.Kind != MiddayStars && !cut {
				t.Errorf("%s %s: Sun off by %.4f' at the best instant", v.name, w.ID, d)
			}
			if w.Best.Before(w.Begin) || w.Best.After(w.End) {
				t.Errorf("%s %s: best %v outside %v to %v", v.name, w.ID, w.Best, w.Begin, w.End)
			}
		}
	}
}

// Between windows the Sun is outside the band: checked every five minutes of
// six voyages, so every window is as long as it can be and none is missing.
func TestWindowsAreMaximal(t *testing.T) {
	set := DefaultSettings()
	for _, v := range readVoyages(t) {
		s := newSky(v.passage, astro.DeltaT)
		windows := planOf(t, v.passage, set).Windows()
		for at := v.passage.Departure; at.Before(v.passage.Arrival); at = at.Add(5 * time.Minute) {
			h := s.altitude(astro.Sun, at)
			inside := h < set.UpperSun && h > set.LowerSun
			in := false
			for _, w := range windows {
				in = in || !at.Before(w.Begin) && !at.After(w.End)
			}
			if in != inside {
				t.Errorf("%s %v: Sun at %.3f°, in a window: %v", v.name, at, h.Deg(), in)
			}
		}
	}
}

func TestDaysWithoutWindowSayWhy(t *testing.T) {
	for _, c := range []struct {
		name      string
		lat       float64
		departure string
		days      float64
		why       string
		remains   string
	}{
		{"after a white night", 58, "2026-06-20T20:00:00Z", 0.5, "the midnight stars of 20 June last into this date", "Sun"},
		{"polar day", 78, "2026-06-20T00:00:00Z", 1, "the Sun does not sink to -6° (lowest 11°", "Sun"},
		{"polar night", 85, "2026-12-20T00:00:00Z", 1, "the Sun does not rise to -12° (highest -18°", "Moon"},
		{"a forenoon", 40, "2026-11-20T09:00:00Z", 0.1, "the day's twilights fall outside the passage", "Sun"},
	} {
		p := planOf(t, hovering(t, c.lat, 0, c.departure, c.days), DefaultSettings())
		d := p.Days[len(p.Days)-1]
		if !strings.HasPrefix(d.NoWindow, c.why) {
			t.Errorf("%s: %q, want %q", c.name, d.NoWindow, c.why)
		}
		names := ""
		for _, r := range d.Remains {
			names += r.Body.String() + " "
			if r.Altitude < p.Settings.LowestAltitude || r.Altitude > p.Settings.HighestAltitude {
				t.Errorf("%s: %v at %.2f°, outside the limits", c.name, r.Body, r.Altitude.Deg())
			}
		}
		if !strings.Contains(names, c.remains) {
			t.Errorf("%s: %q remain, want %s among them", c.name, names, c.remains)
		}
	}
}

// IDs are those of the ship's date and do not change when the ship sails some
// hours later.
func TestWindowIDs(t *testing.T) {
	ids := func(departure string) (all []string) {
		for _, w := range planOf(t, hovering(t, 40, -45, departure, 2), DefaultSettings()).Windows() {
			all = append(all, w.ID)
		}
		return all
	}
	want := "2026-11-20-evening-stars 2026-11-21-morning-stars 2026-11-21-evening-stars 2026-11-22-morning-stars"
	for _, departure := range []string{"2026-11-20T12:00:00Z", "2026-11-20T17:00:00Z"} {
		if got := strings.Join(ids(departure), " "); got != want {
			t.Errorf("departure %s: %s, want %s", departure, got, want)
		}
	}
}

// As many windows as twilights of the kind that opens or shuts them, each with
// an ID of its own, a date lived twice across the date line included.
func TestWindowsOfSixVoyages(t *testing.T) {
	for _, v := range readVoyages(t) {
		if strings.Contains(v.name, "december") {
			continue // twilight noons: see TestWindowKinds
		}
		want := 0
		for _, e := range v.events {
			if e.Kind == CivilDawn || e.Kind == CivilDusk {
				want++
			}
		}
		seen := map[string]bool{}
		for _, w := range planOf(t, v.passage, DefaultSettings()).Windows() {
			if seen[w.ID] {
				t.Errorf("%s: %s twice", v.name, w.ID)
			}
			seen[w.ID] = true
		}
		if len(seen) != want {
			t.Errorf("%s: %d windows, want %d", v.name, len(seen), want)
		}
	}
}
