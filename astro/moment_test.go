package astro

import (
	"math"
	"testing"
	"time"

	"github.com/soniakeys/unit"
)

// atTT is the moment at an instant of terrestrial time.
func atTT(tb testing.TB, tt string, deltaT float64) *Moment {
	tb.Helper()
	at, err := time.Parse(time.RFC3339, tt)
	if err != nil {
		tb.Fatal(err)
	}
	dt := time.Duration(deltaT * float64(time.Second))
	return NewMoment(at.Add(-dt), dt)
}

// Sidereal time: Meeus, examples 12.a and 12.b, from memory, confirmed with IAU
// SOFA: apparent 13h10m46.1351s, mean 128.7378734°. The older precession
// behind the book's values is worth some 0.01 s.
func TestSiderealTime(t *testing.T) {
	m := momentAt(t, "1987-04-10T00:00:00Z", 55)
	want := unit.AngleFromDeg((13 + 10.0/60 + 46.1351/3600) * 15)
	if d := off(circle(m.gast), want) * 4; math.Abs(d) > 0.02 {
		t.Errorf("apparent sidereal time off by %.4f s", d)
	}
	m = momentAt(t, "1987-04-10T19:21:00Z", 55)
	if d := off(circle(m.gast-m.equinoxes()), unit.AngleFromDeg(128.7378734)) * 4; math.Abs(d) > 0.02 {
		t.Errorf("mean sidereal time off by %.4f s", d)
	}
}

// Nutation and obliquity: Meeus, example 22.a, from memory, confirmed with
// SOFA: Δψ = -3.788", ε = 23°26'36.850". IAU 2006 lowers the mean obliquity by
// 0.04".
func TestNutation(t *testing.T) {
	m := atTT(t, "1987-04-10T00:00:00Z", 55)
	if d := m.dpsi/arcsecond + 3.788; math.Abs(d) > 0.002 {
		t.Errorf("Δψ off by %.4f\"", d)
	}
	if d := m.obliq/arcsecond - (23*3600 + 26*60 + 36.850); math.Abs(d) > 0.05 {
		t.Errorf("ε off by %.4f\"", d)
	}
}

// Apparent places, from memory, confirmed with SOFA: Meeus, examples 25.b (Sun),
// 33.a (Venus) and 47.a (Moon; its shortened theory keeps to 10" in longitude).
func TestMeeusPlaces(t *testing.T) {
	hms := func(h, m, s float64) float64 { return 15 * (h + m/60 + s/3600) }
	for _, c := range []struct {
		name    string
		body    Body
		tt      string
		ra, dec float64 // degrees
		seconds float64 // allowed, of arc
	}{
		{"25.b", Sun, "1992-10-13T00:00:00Z", hms(13, 13, 30.749), -(7 + 47.0/60 + 1.74/3600), 0.3},
		{"33.a", Venus, "1992-12-20T00:00:00Z", hms(21, 4, 41.454), -(18 + 53.0/60 + 16.84/3600), 0.3},
		{"47.a", Moon, "1992-04-12T00:00:00Z", 134.688470, 13.768368, 10},
	} {
		m := atTT(t, c.tt, 59)
		p := m.Place(c.body)
		ra, dec := circle(m.gast-p.GHA.Rad()), p.Dec
		if e, n := off(ra, unit.AngleFromDeg(c.ra))*dec.Cos()*60, off(dec, unit.AngleFromDeg(c.dec))*60; math.Hypot(e, n) > c.seconds {
			t.Errorf("example %s: %v off by %.2f\" in RA cos Dec and %.2f\" in Dec", c.name, c.body, e, n)
		}
	}
	// 47.a: distance 368409.7 km, parallax 0.991990°; the lit part of 48.a 0.6786.
	p := atTT(t, "1992-04-12T00:00:00Z", 59).Place(Moon)
	if math.Abs(p.HP.Deg()-0.991990) > 0.00005 || math.Abs(p.Illuminated-0.6786) > 0.001 {
		t.Errorf("Moon's parallax %.6f°, lit %.4f", p.HP.Deg(), p.Illuminated)
	}
	// 41.a: the lit part of Venus 0.647.
	if p := atTT(t, "1992-12-20T00:00:00Z", 59).Place(Venus); math.Abs(p.Illuminated-0.647) > 0.001 {
		t.Errorf("Venus lit %.4f, want 0.647", p.Illuminated)
	}
}

// Common practice, no published source: the sidereal day is 23 h 56 m 04.1 s,
// and a star's declination holds to 0.1' over three days.
func TestSkyTurns(t *testing.T) {
	start := time.Date(2027, 5, 1, 0, 0, 0, 0, time.UTC)
	day := 23*time.Hour + 56*time.Minute + 4100*time.Millisecond
	a, b := NewMoment(start, DeltaT(start)), NewMoment(start.Add(day), DeltaT(start))
	if d := off(b.Place(Aries).GHA, a.Place(Aries).GHA); math.Abs(d) > 0.02 { // 0.1 s is 0.025'
		t.Errorf("Aries is %.4f' off after a sidereal day", d)
	}
	for months := range 12 {
		from := start.AddDate(0, months, 0)
		a, b := NewMoment(from, DeltaT(from)), NewMoment(from.AddDate(0, 0, 3), DeltaT(from))
		for _, star := range Stars() {
			if d := off(b.Place(star).Dec, a.Place(star).Dec); math.Abs(d) > 0.1 {
				t.Errorf("%v: declination changes by %.3f' in three days from %v", star, d, from)
			}
		}
	}
}
