package astro

import (
	"math"
	"testing"

	"github.com/soniakeys/unit"
	"pgregory.net/rapid"
)

// Which limb is lit, on real dates at 35° N on the Greenwich meridian, and why.
// The Moon was new on 8 March 2027 and full on the 22nd; Venus stands at its
// greatest distance east of the Sun in March 2028.
func TestBrightLimb(t *testing.T) {
	for _, c := range []struct {
		name, at string
		body     Body
		want     Limb
	}{
		{"young, after sunset: the Sun is under it", "2027-03-11T18:40:00Z", Moon, Lower},
		{"old, before sunrise: the Sun is under it", "2027-03-05T05:40:00Z", Moon, Lower},
		{"young, in the forenoon: the Sun is above it", "2027-03-11T10:00:00Z", Moon, Upper},
		{"nearly full, risen before sunset: the near way to the Sun leads over the top", "2027-03-20T17:50:00Z", Moon, Upper},
		{"just past full, risen in the night: the near way leads under the horizon", "2027-03-23T20:00:00Z", Moon, Lower},
		{"evening star", "2028-03-20T19:00:00Z", Venus, Lower},
	} {
		m := momentAt(t, c.at, 69)
		lat := degMin(35, 0)
		if hc, _ := m.Place(c.body).From(lat, 0); hc < 0 {
			t.Fatalf("%s: the body is down", c.name)
		}
		if got := BrightLimb(m, c.body, lat, 0); got != c.want {
			t.Errorf("%s: %v limb, want %v", c.name, got, c.want)
		}
	}
}

// twoBodies is a sky of Sun and Moon alone.
type twoBodies struct{ sun, moon Place }

func (s twoBodies) Place(b Body) Place {
	if b == Sun {
		return s.sun
	}
	return s.moon
}

func drawPlace(t *rapid.T, name string) Place {
	return Place{
		GHA: unit.AngleFromDeg(rapid.Float64Range(0, 360).Draw(t, name+" GHA")),
		Dec: unit.AngleFromDeg(rapid.Float64Range(-29, 29).Draw(t, name+" Dec")),
	}
}

// A point a quarter of a degree from the Moon on the way to the Sun is higher
// than the Moon just where the upper limb is lit.
func TestBrightLimbFacesTheSun(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := twoBodies{drawPlace(t, "Sun"), drawPlace(t, "Moon")}
		lat := unit.AngleFromDeg(rapid.Float64Range(-80, 80).Draw(t, "lat"))
		if e := Elongation(s, Moon).Deg(); e < 1 || e > 179 {
			t.Skip("no way to the Sun, or many")
		}
		moon, sun := spherical(-s.moon.GHA.Rad(), s.moon.Dec.Rad()), spherical(-s.sun.GHA.Rad(), s.sun.Dec.Rad())
		way := sun.sub(moon.scale(sun.dot(moon))).unit()
		lon, dec := moon.scale(cos(0.25 * degree)).add(way.scale(sin(0.25 * degree))).lonLat()
		edge, _ := Place{GHA: unit.Angle(-lon), Dec: unit.Angle(dec)}.From(lat, 0)
		centre, _ := s.moon.From(lat, 0)
		rise := (edge - centre).Min()
		// A great circle bends by up to 0.2' in 15' at 80°.
		if centre.Deg() > 80 || centre.Deg() < -80 || math.Abs(rise) < 0.3 {
			t.Skip("near the zenith, or lit from the side")
		}
		if got := BrightLimb(s, Moon, lat, 0); (got == Upper) != (rise > 0) {
			t.Fatalf("%v limb, but the edge to the Sun is %.2f' higher", got, rise)
		}
	})
}

// A Sun under the horizon lights what stands on its own side of the sky from
// below.
func TestSunkenSunLightsFromBelow(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lat := unit.AngleFromDeg(rapid.Float64Range(-80, 80).Draw(t, "lat"))
		at := func(hc, zn float64) Place { // AltAz is its own inverse
			dec, lha := AltAz(unit.AngleFromDeg(zn), unit.AngleFromDeg(hc), lat, 0)
			return Place{GHA: lha, Dec: dec}
		}
		zn := rapid.Float64Range(0, 360).Draw(t, "Zn")
		hc := rapid.Float64Range(0, 89).Draw(t, "Hc")
		sunHc := rapid.Float64Range(-40, -0.1).Draw(t, "Hc of the Sun")
		sunZn := zn + rapid.Float64Range(-89, 89).Draw(t, "to the Sun")
		s := twoBodies{sun: at(sunHc, sunZn), moon: at(hc, zn)}
		if got, _ := s.moon.From(lat, 0); math.Abs(got.Deg()-hc) > 1e-9 {
			t.Fatalf("Hc %v°, want %v°", got.Deg(), hc)
		}
		if got := BrightLimb(s, Moon, lat, 0); got != Lower {
			t.Fatalf("%v limb", got)
		}
	})
}

// Elongation is small at new Moon and near 180° at full (8 and 22 March 2027).
func TestElongation(t *testing.T) {
	if e := Elongation(momentAt(t, "2027-03-08T09:30:00Z", 69), Moon).Deg(); e > 6 {
		t.Errorf("elongation at new Moon %.1f°", e)
	}
	if e := Elongation(momentAt(t, "2027-03-22T10:44:00Z", 69), Moon).Deg(); e < 174 {
		t.Errorf("elongation at full Moon %.1f°", e)
	}
}
