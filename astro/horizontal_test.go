package astro

import (
	"math"
	"testing"

	"github.com/soniakeys/unit"
	"pgregory.net/rapid"
)

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

// At the poles altitude is declination, and Zn runs with the hour angle, as it
// does in the limit on the meridian of the longitude given.
func TestAltAzAtThePoles(t *testing.T) {
	for lha := 0.0; lha < 360; lha += 15 {
		north, zn := AltAz(unit.AngleFromDeg(lha), degMin(20, 0), degMin(90, 0), 0)
		south, zs := AltAz(unit.AngleFromDeg(lha), degMin(20, 0), degMin(-90, 0), 0)
		if math.Abs(north.Deg()-20) > 1e-9 || math.Abs(south.Deg()+20) > 1e-9 {
			t.Errorf("LHA %v°: Hc %v° and %v°, want 20° and -20°", lha, north.Deg(), south.Deg())
		}
		if math.Abs(off(zn, unit.AngleFromDeg(180+lha))) > 1e-6 || math.Abs(off(zs, unit.AngleFromDeg(-lha))) > 1e-6 {
			t.Errorf("LHA %v°: Zn %v° and %v°", lha, zn.Deg(), zs.Deg())
		}
	}
}

// Zn agrees with the cosine rule on latitude, altitude and declination, and lies
// west where LHA is under 180°.
func TestAzimuthByAltitude(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lha := rapid.Float64Range(0.1, 359.9).Draw(t, "LHA")
		dec := unit.AngleFromDeg(rapid.Float64Range(-85, 85).Draw(t, "Dec"))
		lat := unit.AngleFromDeg(rapid.Float64Range(-85, 85).Draw(t, "lat"))
		hc, zn := AltAz(unit.AngleFromDeg(lha), dec, lat, 0)
		if math.Abs(hc.Deg()) > 85 || math.Abs(lha-180) < 0.1 {
			t.Skip("the cosine rule is weak there")
		}
		cosine := (dec.Sin() - lat.Sin()*hc.Sin()) / (lat.Cos() * hc.Cos())
		if d := cosine - zn.Cos(); math.Abs(d) > 1e-9 {
			t.Fatalf("cosine of Zn %.12f, want %.12f", zn.Cos(), cosine)
		}
		if west := zn.Deg() > 180; west != (lha < 180) {
			t.Fatalf("LHA %v° at Zn %v°", lha, zn.Deg())
		}
	})
}

// Arcturus to Spica: Meeus, example 17.a, from memory: 32.7930°, the last figure.
func TestSeparation(t *testing.T) {
	at := func(ra, dec float64) Place { return Place{GHA: -unit.AngleFromDeg(ra), Dec: unit.AngleFromDeg(dec)} }
	arcturus, spica := at(213.9154, 19.1825), at(201.2983, -11.1614)
	if d := arcturus.Separation(spica).Deg(); math.Abs(d-32.7930) > 0.00006 {
		t.Errorf("%.5f°, want 32.7930°", d)
	}
	if d := arcturus.Separation(spica) - spica.Separation(arcturus); math.Abs(d.Rad()) > 1e-14 {
		t.Errorf("%v rad more one way than the other", d.Rad())
	}
	if d := spica.Separation(spica).Deg(); math.Abs(d) > 1e-6 {
		t.Errorf("a star %v° from itself", d)
	}
}
