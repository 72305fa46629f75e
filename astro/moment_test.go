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

// Sidereal time: Meeus, examples 12.a and 12.b, from memory: apparent
// 13h10m46.1351s, mean 128.7378734°. The book's IAU 1982 model starts 0.0145"
// lower at J2000 and runs 0.28" a century faster than IAU 2006: 0.0033 s in
// 1987. Hence 0.005 s.
func TestSiderealTime(t *testing.T) {
	m := momentAt(t, "1987-04-10T00:00:00Z", 55)
	want := unit.AngleFromDeg((13 + 10.0/60 + 46.1351/3600) * 15)
	if d := off(circle(m.gast), want) * 4; math.Abs(d) > 0.005 {
		t.Errorf("apparent sidereal time off by %.4f s", d)
	}
	m = momentAt(t, "1987-04-10T19:21:00Z", 55)
	if d := off(circle(m.gast-m.equinoxes()), unit.AngleFromDeg(128.7378734)) * 4; math.Abs(d) > 0.005 {
		t.Errorf("mean sidereal time off by %.4f s", d)
	}
}

// Nutation and obliquity: Meeus, example 22.a, from memory, confirmed with
// SOFA: Δψ = -3.788", Δε = +9.443", ε = 23°26'36.850". IAU 2006 lowers the mean
// obliquity by 0.0392" in 1987; the rest is the last figure printed.
func TestNutation(t *testing.T) {
	m := atTT(t, "1987-04-10T00:00:00Z", 55)
	if d := m.dpsi/arcsecond + 3.788; math.Abs(d) > 0.002 {
		t.Errorf("Δψ off by %.4f\"", d)
	}
	if d := m.obliq/arcsecond - (23*3600 + 26*60 + 36.850 - 0.0392); math.Abs(d) > 0.002 {
		t.Errorf("ε off by %.4f\"", d)
	}
}

func hms(h, m, s float64) unit.Angle { return unit.AngleFromDeg(15 * (h + m/60 + s/3600)) }
func dms(d, m, s float64) unit.Angle { return degMin(d, m+s/60) }

// Apparent places: Meeus, examples 13.b and 33.a (Venus), 25.b (Sun) and 47.a
// (Moon), from memory. The book's own rounding, its FK5 equinox and its older
// precession are worth some 0.05"; its shortened theory of the Moon keeps to 10"
// in longitude and 4" in latitude.
func TestMeeusPlaces(t *testing.T) {
	for _, c := range []struct {
		name    string
		body    Body
		tt      string
		ra, dec unit.Angle
		seconds float64 // allowed, of arc
	}{
		{"13.b", Venus, "1987-04-10T19:21:55Z", hms(23, 9, 16.641), dms(-6, 43, 11.61), 0.1},
		{"25.b", Sun, "1992-10-13T00:00:00Z", hms(13, 13, 30.749), dms(-7, 47, 1.74), 0.1},
		{"33.a", Venus, "1992-12-20T00:00:00Z", hms(21, 4, 41.454), dms(-18, 53, 16.84), 0.1},
		{"47.a", Moon, "1992-04-12T00:00:00Z", unit.AngleFromDeg(134.688470), unit.AngleFromDeg(13.768368), 10},
	} {
		m := atTT(t, c.tt, 59)
		p := m.Place(c.body)
		ra, dec := circle(m.gast-p.GHA.Rad()), p.Dec
		if e, n := off(ra, c.ra)*dec.Cos()*60, off(dec, c.dec)*60; math.Hypot(e, n) > c.seconds {
			t.Errorf("example %s: %v off by %.2f\" in RA cos Dec and %.2f\" in Dec", c.name, c.body, e, n)
		}
	}
}

// Distance and look, from memory. Meeus gives the Sun's distance in 25.b and
// that of Venus in 33.a, the Moon's parallax in 47.a (10 km of 368409.7 is
// 0.00003°), the lit parts in 41.a and 48.a. The magnitude of Venus is by the
// formula of the Astronomical Almanac from 1984; the book's other one, on
// Müller's scale, gives -3.8.
func TestMeeusLooks(t *testing.T) {
	distance := func(p Place) float64 { return equatorAU / p.HP.Sin() }
	sun := atTT(t, "1992-10-13T00:00:00Z", 59).Place(Sun)
	venus := atTT(t, "1992-12-20T00:00:00Z", 59).Place(Venus)
	moon := atTT(t, "1992-04-12T00:00:00Z", 59).Place(Moon)
	for _, c := range []struct {
		name                 string
		got, want, tolerance float64
	}{
		{"25.b, the Sun's distance (AU; the book's series are cut)", distance(sun), 0.99760775, 2e-6},
		{"33.a, distance of Venus (AU, last figure)", distance(venus), 0.91095, 6e-6},
		{"41.a, lit part of Venus (last figure)", venus.Illuminated, 0.647, 0.0006},
		{"41, magnitude of Venus (another fit of the same curve)", venus.Magnitude, -4.22, 0.1},
		{"47.a, the Moon's parallax (degrees)", moon.HP.Deg(), 0.991990, 0.00003},
		{"48.a, lit part of the Moon (last figure)", moon.Illuminated, 0.6786, 0.0001},
	} {
		if math.Abs(c.got-c.want) > c.tolerance {
			t.Errorf("example %s: %.7f, want %.7f", c.name, c.got, c.want)
		}
	}
}

// Equation of time: Meeus, example 28.a, from memory: 3.427351°. There the mean
// Sun is that of TD, here GHA goes by UT, in which it has 0.0027379 ΔT less to
// run. The book's mean longitude differs from the mean Sun of UT by 0.43", 0.03
// s. Hence 0.05 s.
func TestEquationOfTime(t *testing.T) {
	const deltaT = 59
	m := atTT(t, "1992-10-13T00:00:00Z", deltaT)
	got := off(m.Place(Sun).GHA, unit.AngleFromDeg(180-deltaT*15.0/3600)) * 4
	if want := 3.427351*240 - 0.0027379*deltaT; math.Abs(got-want) > 0.05 {
		t.Errorf("%.3f s, want %.3f s", got, want)
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
