package plan

import (
	"math"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
	"gloam/track/magnetic"
)

// Amplitudes of textbook and examination problems (US Navy Quartermaster;
// USCG and other examinations, gathered in one list), the bearing of the Sun's
// centre on the celestial horizon at a latitude and declination; their last
// figure, half of it allowed.
func TestAmplitudes(t *testing.T) {
	for _, c := range []struct {
		lat, dec float64
		sets     bool
		want     float64
		figure   float64
	}{
		{51, 19, true, 301.2, 0.06}, {-37 - 10.0/60, 13 + 37.0/60, true, 287.18, 0.006},
		{32 + 12.0/60, -6 - 7.5/60, false, 97.2, 0.06}, {40 + 28.0/60, 7 + 53.2/60, false, 79.6, 0.06}, {30 + 6.0/60, 15 + 24.2/60, true, 287.9, 0.06},
		{-54 - 20.0/60, -20 - 7.0/60, true, 233.9, 0.06} /* printed 234.0, recomputed with SOFA 233.9 */, {49 + 18.0/60, -21 - 39.0/60, false, 124.4, 0.11}, {0, -0 - 18.6/60, false, 90.3, 0.06},
		{-21 - 56.1/60, -22 - 45.7/60, true, 245.35, 0.006}, {24.5, -21 - 45.1/60, false, 114.0, 0.06}, {25 + 32.0/60, -14 - 28.5/60, false, 106.1, 0.06},
	} {
		lat, dec := unit.AngleFromDeg(c.lat), unit.AngleFromDeg(c.dec)
		ha := math.Acos(-lat.Tan() * dec.Tan()) // where the altitude is nothing
		if !c.sets {
			ha = -ha
		}
		hc, zn := astro.AltAz(unit.Angle(ha), dec, lat, 0)
		if math.Abs(hc.Deg()) > 1e-9 || math.Abs(zn.Deg()-c.want) > c.figure {
			t.Errorf("%v %v: %.3f°, want %v°", c.lat, c.dec, zn.Deg(), c.want)
		}
	}
	for zn, want := range map[float64]string{78: "Amplitude E 12.0° N", 112: "Amplitude E 22.0° S", 301.2: "Amplitude W 31.2° N", 248: "Amplitude W 22.0° S"} {
		if got := amplitude(unit.AngleFromDeg(zn)); got != want {
			t.Errorf("%v: %s, want %s", zn, got, want)
		}
	}
}

// Azimuths by time of the same sources, 0.1° as printed.
func TestAzimuthsByTime(t *testing.T) {
	for _, c := range []struct {
		at       string
		lat, lon float64
		want     float64
	}{
		{"2008-09-22T10:09:38Z", 18 + 20.0/60, 85 + 40.0/60, 259.8},
		{"2008-07-20T04:06:12Z", 44 + 31.0/60, 69 + 42.0/60, 103.1},
	} {
		m := astro.NewMoment(instant(t, c.at), 65600*time.Millisecond)
		if _, zn := m.Place(astro.Sun).From(unit.AngleFromDeg(c.lat), unit.AngleFromDeg(c.lon)); math.Abs(zn.Deg()-c.want) > 0.051 {
			t.Errorf("%s: %.2f°, want %v°", c.at, zn.Deg(), c.want)
		}
	}
}

// The day's checks: rising and setting on the celestial horizon, a low Sun in
// every watch that has one, a star in the window; bearings that add up; Polaris
// in northern waters.
func TestCompassChecks(t *testing.T) {
	p := planOf(t, hovering(t, 42, -40, "2027-03-10T00:00:00Z", 1.5), DefaultSettings())
	titles := map[string]int{}
	for _, item := range itemsOf(p, Compass) {
		titles[item.Title]++
		c := item.Checks[0]
		if d := math.Abs(math.Remainder((c.True - c.Variation - c.Magnetic).Deg(), 360)); d > 1e-9 {
			t.Errorf("%s: true %.2f°, variation %.2f°, compass %.2f°", item.Title, c.True.Deg(), c.Variation.Deg(), c.Magnetic.Deg())
		}
		if d := math.Abs(math.Remainder((c.True - c.Fix.Course - c.Relative).Deg(), 360)); d > 1e-9 {
			t.Errorf("%s: true %.2f° on course %.2f° is not %.2f° from the bow", item.Title, c.True.Deg(), c.Fix.Course.Deg(), c.Relative.Deg())
		}
		switch {
		case strings.HasPrefix(item.Title, "Amplitude") && math.Abs(c.Altitude.Min()) > 0.001: // the precision of a root
			t.Errorf("%s: the centre stands at %.3f'", item.Title, c.Altitude.Min())
		case strings.HasPrefix(item.Title, "Azimuth of the low") && (c.Altitude < lowSunFrom || c.Altitude > lowSunTo):
			t.Errorf("%s: the Sun stands at %.1f°", item.Title, c.Altitude.Deg())
		}
		if c.Doubtful != "" {
			t.Errorf("%s: %s", item.Title, c.Doubtful)
		}
	}
	for _, want := range []string{"Amplitude, Sun rising", "Amplitude, Sun setting", "Azimuth of Polaris"} {
		if titles[want] == 0 {
			t.Errorf("no %s in %v", want, titles)
		}
	}
	if titles["Azimuth of the low Sun"] < 2 {
		t.Errorf("%d azimuths of the low Sun, want morning and afternoon", titles["Azimuth of the low Sun"])
	}
	// Variation at 42° N 40° W in 2027 by the model itself: west, some 13° (memory of a chart).
	if v := magnetic.At(unit.AngleFromDeg(42), unit.AngleFromDeg(-40), instant(t, "2027-03-10T00:00:00Z")).Variation().Deg(); v > -10 || v < -17 {
		t.Errorf("variation %.1f°", v)
	}
}

// Outside the model's years, and where the horizontal field is weak, the check
// says that it is not to be trusted.
func TestDoubtfulVariation(t *testing.T) {
	for _, c := range []struct {
		lat, lon float64
		date     string
		want     string
	}{
		{42, -40, "2031-03-10T00:00:00Z", "2025 to 2030 only"},
		{86, -150, "2027-03-20T00:00:00Z", "the horizontal field is weak"},
	} {
		s := newSky(hovering(t, c.lat, c.lon, c.date, 1), astro.DeltaT)
		if got := s.check(astro.Sun, instant(t, c.date)).Doubtful; !strings.Contains(got, c.want) {
			t.Errorf("%v %v on %s: %q, want %q", c.lat, c.lon, c.date, got, c.want)
		}
	}
}

// Watches end at 4, 8, 12 ... by the ship's clock, of whatever offset.
func TestWatches(t *testing.T) {
	p := hovering(t, 0, 0, "2027-03-10T00:00:00Z", 2)
	for _, c := range []struct {
		offset   time.Duration
		at, want string
	}{
		{0, "2027-03-10T05:00:00Z", "2027-03-10T08:00:00Z"}, {0, "2027-03-10T08:00:00Z", "2027-03-10T12:00:00Z"},
		{-3 * time.Hour, "2027-03-10T05:00:00Z", "2027-03-10T07:00:00Z"}, {5*time.Hour + 30*time.Minute, "2027-03-10T05:00:00Z", "2027-03-10T06:30:00Z"},
	} {
		clock := track.NewClock(p, track.FixedTime(c.offset))
		if got := endOfWatch(instant(t, c.at), clock); !got.Equal(instant(t, c.want)) {
			t.Errorf("%v %s: %v, want %s", c.offset, c.at, got, c.want)
		}
	}
}

// Moonlit windows: asked for only; the Moon half lit and ten degrees up, the Sun
// under its lower limit, bodies on the Moon's side, marked doubtful.
func TestMoonlit(t *testing.T) {
	passage := hovering(t, 35, -30, "2027-01-20T00:00:00Z", 3) // full Moon on the 22nd
	set := DefaultSettings()
	if items := itemsOf(planOf(t, passage, set), Moonlit); len(items) > 0 {
		t.Errorf("%d moonlit windows unasked", len(items))
	}
	set.Kinds = ItemKinds
	s := newSky(passage, astro.DeltaT)
	items := itemsOf(planOf(t, passage, set), Moonlit)
	if len(items) < 2 {
		t.Fatalf("%d moonlit windows, want some", len(items))
	}
	for _, item := range items {
		moon, hc, zn := s.place(astro.Moon, item.Best)
		if moon.Illuminated < 0.5 || hc < moonlitAltitude || s.altitude(astro.Sun, item.Best) > set.LowerSun {
			t.Errorf("%s: Moon %.0f %% lit, %.1f° high", item.ID, 100*moon.Illuminated, hc.Deg())
		}
		for _, r := range item.Sights {
			if d := math.Abs(math.Remainder((r.Azimuth - zn).Deg(), 360)); d > 91 { // it moves by a degree in the round
				t.Errorf("%s: %v is %.0f° from the Moon", item.ID, r.Body, d)
			}
		}
		if item.Window.Kind != MoonlitStars || !strings.Contains(item.Words[0], "false") {
			t.Errorf("%s: %+v", item.ID, item.Words)
		}
	}
}

// Either limb serves when the Moon is all but full, and where the lit side lies
// straight up or down for no other phase.
func TestEitherLimb(t *testing.T) {
	for _, c := range []struct {
		at   string
		want bool
	}{{"2027-01-22T12:17:00Z", true}, {"2027-01-15T20:35:00Z", false}, {"2027-01-07T20:24:00Z", false}} { // full, first quarter, new
		m := astro.NewMoment(instant(t, c.at), 69*time.Second)
		moon := m.Place(astro.Moon)
		if got := astro.EitherLimb(m, moon.Dec, -moon.GHA); got != c.want {
			t.Errorf("%s, %.1f %% lit: %v", c.at, 100*moon.Illuminated, got)
		}
	}
}

// Latitude by Polaris, USCG examination items with the answers recomputed by IAU
// SOFA routines: from the latitude found, the computed altitude is the observed
// one. 0.3', as for a worked latitude.
func TestPolaris(t *testing.T) {
	polaris, err := astro.ParseBody("Polaris")
	if err != nil {
		t.Fatal(err)
	}
	deg := func(d, m float64) unit.Angle { return unit.AngleFromDeg(d + m/60) }
	for _, c := range []struct {
		at                        string
		lat, lon, hs, index, feet float64
	}{
		{"1981-05-05T23:53:21Z", 29 + 23.54/60, -66 - 25.7/60, 29 + 7.2/60, 1.5, 56},
		{"1981-03-15T03:46:42Z", 21 + 49.72/60, -132 - 16.2/60, 22 + 16.8/60, -3.2, 44.9},
		{"1981-09-24T09:41:24Z", 25 + 37.47/60, 129 + 34.5/60, 25 + 20.8/60, -4.3, 52},
		{"1981-01-17T02:03:48Z", 36 + 17.81/60, -124 - 36.0/60, 37 + 16.4/60, 1.5, 60},
	} {
		sextant := astro.Sextant{EyeM: c.feet * 0.3048, IndexError: unit.AngleFromMin(c.index), TemperatureC: 10, PressureHPa: 1010}
		place := astro.NewMoment(instant(t, c.at), 51800*time.Millisecond).Place(polaris)
		ho := sextant.Observed(unit.AngleFromDeg(c.hs), place, astro.Centre)
		if hc, _ := place.From(unit.AngleFromDeg(c.lat), unit.AngleFromDeg(c.lon)); math.Abs((hc - ho).Min()) > 0.3 {
			t.Errorf("%s: Hc %.2f', Ho %.2f'", c.at, hc.Min(), ho.Min())
		}
	}
	// 29 Jul 1981, 24° 16.8' N, LHA Aries 238° 48.3': azimuth printed 000.3°,
	// recomputed 000.4°.
	m := astro.NewMoment(instant(t, "1981-07-29T08:30:00Z"), 51800*time.Millisecond)
	lon := deg(238, 48.3) - m.Place(astro.Aries).GHA
	if _, zn := m.Place(polaris).From(deg(24, 16.8), lon); math.Abs(zn.Deg()-0.35) > 0.1 {
		t.Errorf("azimuth of Polaris %.2f°", zn.Deg())
	}
}
