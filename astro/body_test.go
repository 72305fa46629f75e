package astro

import (
	"math"
	"slices"
	"strings"
	"testing"

	"github.com/soniakeys/unit"
	"pgregory.net/rapid"
)

func TestBodies(t *testing.T) {
	if n := len(Stars()); n != 58 {
		t.Fatalf("%d stars, want 57 and Polaris", n)
	}
	seen := map[string]bool{}
	for _, b := range Bodies() {
		got, err := ParseBody(strings.ToUpper(b.String()))
		if err != nil || got != b || seen[b.String()] {
			t.Errorf("%v parses as %v (%v), or its name is not its own", b, got, err)
		}
		seen[b.String()] = true
	}
	if _, err := ParseBody("Pluto"); err == nil || !strings.Contains(err.Error(), `"Pluto"`) {
		t.Errorf("Pluto: %v", err)
	}
	for b, want := range map[Body]Class{Sun: ClassSun, Moon: ClassMoon, Venus: ClassPlanet, Saturn: ClassPlanet, Aries: ClassPoint, Stars()[0]: ClassStar} {
		if b.Class() != want {
			t.Errorf("%v is a %v, want %v", b, b.Class(), want)
		}
	}
	var names []string
	for _, b := range Stars()[:57] {
		names = append(names, b.String())
	}
	if !slices.IsSorted(names) {
		t.Error("the stars are not in alphabetical order")
	}
}

// Straight overhead, at a pole, round the horizon.
func TestAltAzEdges(t *testing.T) {
	right := unit.AngleFromDeg(90)
	for _, c := range []struct {
		name          string
		lha, dec, lat unit.Angle
		hc, zn        float64
		noAzimuth     bool
	}{
		{"overhead", 0, degMin(20, 0), degMin(20, 0), 90, 0, true},
		{"from the pole", degMin(50, 0), degMin(20, 0), right, 20, 0, true},
		{"north of the equator, on the meridian", 0, degMin(10, 0), degMin(40, 0), 60, 180, false},
		{"south, on the meridian", 0, degMin(10, 0), degMin(-40, 0), 40, 0, false},
		{"setting due west", degMin(90, 0), 0, degMin(40, 0), 0, 270, false},
		{"rising due east", degMin(270, 0), 0, degMin(40, 0), 0, 90, false},
		{"under foot", degMin(180, 0), degMin(-20, 0), degMin(20, 0), -90, 0, true},
	} {
		hc, zn := AltAz(c.lha, c.dec, c.lat, 0)
		if math.Abs(hc.Deg()-c.hc) > 1e-6 || !c.noAzimuth && math.Abs(zn.Deg()-c.zn) > 1e-9 {
			t.Errorf("%s: %.6f°, %.6f°, want %v°, %v°", c.name, hc.Deg(), zn.Deg(), c.hc, c.zn)
		}
	}
}

// Ranges hold everywhere, and Hc is 90° less the distance to the zenith.
func TestAltAzProperties(t *testing.T) {
	angle := rapid.Float64Range(-360, 360)
	rapid.Check(t, func(t *rapid.T) {
		gha, lon := unit.AngleFromDeg(angle.Draw(t, "GHA")), unit.AngleFromDeg(angle.Draw(t, "lon"))
		dec := unit.AngleFromDeg(rapid.Float64Range(-90, 90).Draw(t, "Dec"))
		lat := unit.AngleFromDeg(rapid.Float64Range(-90, 90).Draw(t, "lat"))
		hc, zn := AltAz(gha, dec, lat, lon)
		if !(zn >= 0 && zn < 2*math.Pi) || !(math.Abs(hc.Deg()) <= 90+1e-12) {
			t.Fatalf("Hc %v°, Zn %v°", hc.Deg(), zn.Deg())
		}
		zenith := Place{GHA: -lon, Dec: lat}
		if d := (zenith.Separation(Place{GHA: gha, Dec: dec}) + hc).Deg() - 90; math.Abs(d) > 1e-6 {
			t.Fatalf("zenith distance and altitude miss 90° by %v°", d)
		}
	})
}

// A young Moon in the western sky after sunset is lit from below, an old one
// in the east before sunrise likewise; a Moon on the meridian's far side from a
// high Sun is lit from above. Dates: the Moon's age by the ephemeris; the limb
// by where the Sun stands.
func TestBrightLimb(t *testing.T) {
	for _, c := range []struct {
		name string
		at   string
		lon  float64
		want Limb
	}{
		{"young, after sunset", "2027-03-11T18:40:00Z", 0, Lower}, // new on the 8th
		{"old, before sunrise", "2027-03-05T05:40:00Z", 0, Lower},
		{"young, in the forenoon below the Sun", "2027-03-11T10:00:00Z", 0, Upper},
	} {
		m := momentAt(t, c.at, 69)
		lat, lon := degMin(35, 0), unit.AngleFromDeg(c.lon)
		moon, _ := m.Place(Moon).From(lat, lon)
		if moon < 0 {
			t.Fatalf("%s: the Moon is down", c.name)
		}
		if got := BrightLimb(m, Moon, lat, lon); got != c.want {
			t.Errorf("%s: %v limb, want %v", c.name, got, c.want)
		}
	}
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
