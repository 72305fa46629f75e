package astro

import (
	"math"
	"testing"
	"time"

	"github.com/soniakeys/unit"
)

// noMoon is a Moon below the horizon.
var noMoon = Light{Altitude: unit.AngleFromDeg(-45)}

func sunAt(altitude float64) Light {
	return Light{Altitude: unit.AngleFromDeg(altitude), Azimuth: unit.AngleFromDeg(270)}
}

// listingAir is that of the model's published listing but for the place: sea
// level, 70 % humidity, 20 °C, latitude 30°, February 1998.
var listingAir = NewAir(20, 0.70, unit.AngleFromDeg(30), time.Date(1998, 2, 1, 0, 0, 0, 0, time.UTC))

var zenith = unit.AngleFromDeg(90)

// Source: an independent coding of the published listing (calc, regression
// values, three figures): zenith brightness in nanolamberts and limiting
// magnitude. 3 % of brightness and 0.02 of magnitude: the third figure, and the
// fraction of the year, which the listing leaves out.
func TestTwilightOfTheListing(t *testing.T) {
	for depression, want := range map[float64][2]float64{
		0: {5.97e7, -1.04}, 3: {3.65e6, 1.41}, 6: {2.23e5, 2.97}, 9: {1.37e4, 3.62}, 12: {879, 4.34}, 15: {95.1, 5.91}, 18: {47.0, 6.28},
	} {
		b := listingAir.Brightness(sunAt(-depression), noMoon, zenith, 0)
		m := listingAir.LimitingMagnitude(b, zenith)
		if math.Abs(b/want[0]-1) > 0.03 || math.Abs(m-want[1]) > 0.02 {
			t.Errorf("Sun at -%v°: %.4g nL and magnitude %.3f, want %.4g and %.2f", depression, b, m, want[0], want[1])
		}
	}
}

// Source: Koomen and others, J. Opt. Soc. Am. 42, 353 (1952), zenith luminance
// measured in Maryland, 30 m above the sea (read second hand). The model falls
// by exactly one magnitude a degree, the sky a little faster: a factor of 3.
func TestTwilightAsMeasured(t *testing.T) {
	for depression, want := range map[float64]float64{0: 5.07e7, 3: 6.76e6, 6: 2.03e5, 9: 5.07e3, 12: 406, 15: 135} {
		if b := listingAir.Brightness(sunAt(-depression), noMoon, zenith, 0); b > want*3 || b < want/3 {
			t.Errorf("Sun at -%v°: %.4g nL, measured %.4g", depression, b, want)
		}
	}
}

// The full Moon at 45° brightens the sky 45° from it to some 2e3 nL (calc: an
// independent coding gives 1.88e3 at 1000 m in drier air), and a thin or sunken
// Moon hardly at all.
func TestMoonlight(t *testing.T) {
	moon := Light{Altitude: unit.AngleFromDeg(45), Azimuth: unit.AngleFromDeg(90)}
	dark := listingAir.Brightness(sunAt(-30), noMoon, zenith, 0)
	full := listingAir.Brightness(sunAt(-30), moon, zenith, 0)
	if full < 1000 || full > 4000 {
		t.Errorf("full Moon: %.4g nL", full)
	}
	moon.Phase = unit.AngleFromDeg(170)
	if thin := listingAir.Brightness(sunAt(-30), moon, zenith, 0); thin > 1.1*dark || thin < dark {
		t.Errorf("thin Moon: %.4g nL, dark %.4g", thin, dark)
	}
}

// Common practice, no published source: stars of the first magnitude come out
// near the end of civil twilight, first away from the sunset. By eye, halfway up.
func TestFirstStars(t *testing.T) {
	air := NewAir(10, 0.7, unit.AngleFromDeg(40), time.Date(2027, 3, 1, 0, 0, 0, 0, time.UTC))
	half := unit.AngleFromDeg(40)
	appears := func(zn float64) float64 {
		for depression := 0.0; depression < 12; depression += 0.05 {
			b := air.Brightness(sunAt(-depression), noMoon, half, unit.AngleFromDeg(zn))
			if air.LimitingMagnitude(b, half) > 1 {
				return depression
			}
		}
		return 12
	}
	under, away := appears(270), appears(90)
	if away > under || away < 2 || under > 7 {
		t.Errorf("first magnitude at -%.1f° towards the Sun, -%.1f° away from it", under, away)
	}
}

// Dimming is that of the sum of coefficients at the zenith, 0.3 to 0.5 at sea,
// and grows without bound or break to the horizon.
func TestExtinction(t *testing.T) {
	air := NewAir(10, 0.7, 0, time.Date(2027, 3, 1, 0, 0, 0, 0, time.UTC))
	last := air.Extinction(zenith)
	if last < 0.3 || last > 0.6 {
		t.Errorf("%.3f magnitudes at the zenith", last)
	}
	for h := 89.0; h >= 0; h-- {
		x := air.Extinction(unit.AngleFromDeg(h))
		if !(x > last) || math.IsInf(x, 0) {
			t.Fatalf("%.3f magnitudes at %v°, %.3f a degree higher", x, h, last)
		}
		last = x
	}
}
