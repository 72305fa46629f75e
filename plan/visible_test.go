package plan

import (
	"bytes"
	"math"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

func TestArcs(t *testing.T) {
	a, err := ParseArc("350-20")
	if err != nil {
		t.Fatal(err)
	}
	for bearing, want := range map[float64]bool{350: true, 0: true, 20: true, 21: false, 349: false, 180: false} {
		if got := a.Contains(unit.AngleFromDeg(bearing)); got != want {
			t.Errorf("350-20 contains %v°: %v", bearing, got)
		}
	}
	for _, text := range []string{"", "180", "a-b", "0-360", "90-90", "-10-20", "10-370", "NaN-20"} {
		if a, err := ParseArc(text); err == nil {
			t.Errorf("%q read as %v", text, a)
		}
	}
}

// The horizon opposite the Sun goes at -10°, under it at -11.5° (common
// practice, no published source); a Moon more than half lit and over 10° high
// keeps it.
func TestHorizon(t *testing.T) {
	set := DefaultSettings()
	west, east := unit.AngleFromDeg(270), unit.AngleFromDeg(90)
	for _, c := range []struct {
		sun         float64
		under, away bool
	}{{-9.9, true, true}, {-10.1, true, false}, {-11.4, true, false}, {-11.6, false, false}} {
		l := lookout{set: &set, sun: astro.Light{Altitude: unit.AngleFromDeg(c.sun), Azimuth: west}}
		if l.horizon(west) != c.under || l.horizon(east) != c.away {
			t.Errorf("Sun at %v°: horizon under it %v, opposite %v", c.sun, l.horizon(west), l.horizon(east))
		}
		l.moonlit = true
		if !l.horizon(west) || !l.horizon(east) {
			t.Errorf("Sun at %v°: no horizon by moonlight", c.sun)
		}
	}
}

// In the evening the bright come into sight first and the horizon opposite the
// Sun goes first; spans lie in the window; the usable part is where three are.
func TestSpans(t *testing.T) {
	windows := 0
	for _, v := range readVoyages(t) {
		for _, w := range planOf(t, v.passage, DefaultSettings()).Windows() {
			count := func(at time.Time) (n int) {
				for _, c := range w.Bodies {
					if !at.Before(c.From) && !at.After(c.To) {
						n++
					}
				}
				return n
			}
			for _, c := range w.Bodies {
				if c.From.Before(w.Begin) || c.To.After(w.End) || c.To.Before(c.From) {
					t.Errorf("%s %v: %v to %v, outside %v to %v", w.ID, c.Body, c.From, c.To, w.Begin, w.End)
				}
			}
			if w.Usable[0].IsZero() {
				continue
			}
			windows++
			if count(w.Usable[0]) < 3 || count(w.Usable[1]) < 3 {
				t.Errorf("%s: %d and %d bodies at the ends of the usable part", w.ID, count(w.Usable[0]), count(w.Usable[1]))
			}
			if before := count(w.Usable[0].Add(-time.Second)); before >= 3 {
				t.Errorf("%s: %d bodies before the usable part", w.ID, before)
			}
			if after := count(w.Usable[1].Add(time.Second)); after >= 3 {
				t.Errorf("%s: %d bodies after the usable part", w.ID, after)
			}
		}
	}
	if windows < 60 {
		t.Errorf("%d windows with a usable part, want 60 or more", windows)
	}
}

func TestBrightComeFirst(t *testing.T) {
	set := DefaultSettings()
	set.TelescopeGain, set.UpperSun = 0, unit.AngleFromDeg(-3)
	p := planOf(t, hovering(t, 40, 0, "2026-11-08T12:00:00Z", 0.4), set) // new Moon on the 9th
	w := p.Windows()[0]
	find := func(name string) *Candidate {
		for i := range w.Bodies {
			if w.Bodies[i].Body.String() == name {
				return &w.Bodies[i]
			}
		}
		t.Fatalf("no %s among the bodies", name)
		return nil
	}
	if vega, kochab := find("Vega"), find("Kochab"); !vega.From.Before(kochab.From) {
		t.Errorf("Vega from %v, Kochab, two magnitudes fainter, from %v", vega.From, kochab.From)
	}
	// Alpheratz stands in the east, Altair in the south-west.
	if east, west := find("Alpheratz"), find("Altair"); !east.To.Before(west.To) {
		t.Errorf("Alpheratz until %v, Altair until %v", east.To, west.To)
	}
}

// Clouds, blind arcs and bodies left out are kept out of everything.
func TestLeftOut(t *testing.T) {
	set := DefaultSettings()
	set.Clouds = []Arc{{unit.AngleFromDeg(180), unit.AngleFromDeg(300)}}
	set.Blind = []Arc{{unit.AngleFromDeg(150), unit.AngleFromDeg(210)}}
	set.Without = []astro.Body{astro.Venus, astro.Stars()[0]}
	for _, w := range planOf(t, readVoyages(t)[0].passage, set).Windows() {
		for _, r := range w.Round {
			if within(set.Clouds, r.Azimuth) || within(set.Blind, r.Relative) || r.Body == astro.Venus {
				t.Errorf("%s: %v bears %.0f°, %.0f° from the bow", w.ID, r.Body, r.Azimuth.Deg(), r.Relative.Deg())
			}
		}
	}
}

func TestWarnings(t *testing.T) {
	body := func(b astro.Body, gha, magnitude float64) Candidate {
		return Candidate{Body: b, Place: astro.Place{GHA: unit.AngleFromDeg(gha), Magnitude: magnitude}}
	}
	stars := astro.Stars()
	bodies := []Candidate{body(stars[0], 0, 1), body(stars[1], 3, 1.5), body(astro.Jupiter, 20, -2), body(stars[2], 22, 2)}
	got := strings.Join(warnings(bodies, astro.Place{GHA: unit.AngleFromDeg(23)}, &lookout{moonlit: true}), "; ")
	for _, want := range []string{
		"Acamar and Achernar are 3.0° apart", "Jupiter stands 3.0° from the Moon", "Acrux stands 1.0° from the Moon", "under the Moon it can be false",
	} {
		if !strings.Contains(got, want) {
			t.Errorf("no %q in %q", want, got)
		}
	}
	if strings.Contains(got, "Jupiter and Acrux") {
		t.Errorf("four magnitudes apart, yet taken for twins: %q", got)
	}
}

// The least error for n sights is 2 s/√n: ratio 1 when evenly spaced; a third
// body between two at right angles is worth its ratio by hand.
func TestRatioToTheLeast(t *testing.T) {
	set := DefaultSettings()
	if q := set.quality(nil, sightsAt(0.5, 0, 120, 240)); math.Abs(q.Ratio-1) > 1e-9 {
		t.Errorf("ratio %.6f for 120°, want 1", q.Ratio)
	}
	// Two at right angles, s = b = 0.5': √(2 s² + 2 b²) = 1 against 2 s/√2.
	if q := set.quality(nil, sightsAt(0.5, 0, 90)); math.Abs(q.Ratio-math.Sqrt2) > 1e-9 {
		t.Errorf("ratio %.6f for 90°, want √2", q.Ratio)
	}
}

// The report of one instant agrees with the plan of the same passage.
func TestReportAgreesWithPlan(t *testing.T) {
	from := track.PositionFromDeg(49.2, -12.5)
	at := instant(t, "2027-03-01T18:57:00Z")
	r, err := NewReport(at, from, unit.AngleFromDeg(245), 6, DefaultSettings())
	if err != nil {
		t.Fatal(err)
	}
	m := astro.NewMoment(at, astro.DeltaT(at))
	shootable := 0
	for _, b := range r.Bodies {
		hc, zn := m.Place(b.Body).From(from.Lat, from.Lon)
		if math.Abs((b.Altitude-hc).Min()) > 0.01 || math.Abs((b.Azimuth-zn).Min()) > 0.1 {
			t.Errorf("%v at %.3f°, %.3f°, directly %.3f°, %.3f°", b.Body, b.Altitude.Deg(), b.Azimuth.Deg(), hc.Deg(), zn.Deg())
		}
		if b.Hidden == "" {
			shootable++
		}
	}
	if shootable < len(r.Window.Round) || len(r.Window.Round) != 6 {
		t.Errorf("%d bodies to shoot, %d in the round", shootable, len(r.Window.Round))
	}
	var text bytes.Buffer
	if err := r.WriteText(&text, false); err != nil || !strings.Contains(text.String(), "best triad") {
		t.Errorf("%v in\n%s", err, &text)
	}
}
