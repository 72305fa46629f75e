package plan

import (
	"math"
	"math/rand/v2"
	"regexp"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// oneDay is a ship under way for a day from a random place and time, with her
// plan: latitudes from 65° S to 78° N.
func oneDay(tb testing.TB, rng *rand.Rand, knots float64) (*track.Passage, *Plan) {
	tb.Helper()
	lat, course := -65+143*rng.Float64(), 360*rng.Float64()
	at := time.Date(2025, 1, 1, 0, 0, 0, 0, time.UTC).Add(time.Duration(rng.IntN(5*365*24)) * time.Hour)
	p, err := track.Ahead(track.PositionFromDeg(lat, 360*rng.Float64()-180), unit.AngleFromDeg(course), knots, at, 24*time.Hour)
	if err != nil {
		tb.Fatal(err)
	}
	set := DefaultSettings()
	set.Kinds = ItemKinds
	return p, planOf(tb, p, set)
}

// itemsOf are the items of a kind.
func itemsOf(p *Plan, kind ItemKind) (all []Item) {
	for _, d := range p.Days {
		for _, item := range d.Programme {
			if item.Kind == kind {
				all = append(all, item)
			}
		}
	}
	return all
}

// The instant of greatest altitude against a scan in steps of a second, and
// against the published formula: 48/π (tan L - tan d)(d' - L') seconds after
// meridian passage, with the changes of declination and latitude in minutes an
// hour (Wilson, Navigation 32, 1, 1985; memory), for a Sun that turns 900' an
// hour; by the ship's change of longitude it turns faster or slower, which goes
// in squared. The formula is of the first order: 2 s, and 2 % of the interval.
func TestGreatestAltitude(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 32))
	checked, longest := 0, 0.0
	for range 100 {
		passage, p := oneDay(t, rng, 25*rng.Float64())
		s := newSky(passage, astro.DeltaT)
		for _, item := range itemsOf(p, Noon) {
			if len(item.Sights) == 0 {
				continue
			}
			var event time.Time
			for _, e := range p.Events() {
				if e.Kind == MeridianPassage && e.Time.Sub(item.Best).Abs() < 2*time.Hour {
					event = e.Time
				}
			}
			if event.Sub(passage.Departure) < time.Hour || passage.Arrival.Sub(event) < time.Hour {
				continue // the scan would leave the passage
			}
			best, highest := event, s.altitude(astro.Sun, event)
			for d := -40 * time.Minute; d <= 40*time.Minute; d += time.Second {
				if h := s.altitude(astro.Sun, event.Add(d)); h > highest {
					best, highest = event.Add(d), h
				}
			}
			if best.Sub(item.Best).Abs() > 2*time.Second { // the scan's step, and what rounding leaves of so flat a top
				t.Errorf("greatest altitude at %v, by scan %v", item.Best, best)
			}
			rate := func(f func(time.Time) float64) float64 {
				return (f(event.Add(time.Hour/2)) - f(event.Add(-time.Hour/2))) * 60
			}
			lat, dec := passage.At(event).Lat, s.ephemeris.Place(astro.Sun, event).Dec
			dLat := rate(func(at time.Time) float64 { return passage.At(at).Lat.Deg() })
			dDec := rate(func(at time.Time) float64 { return s.ephemeris.Place(astro.Sun, at).Dec.Deg() })
			turns := 900 + rate(func(at time.Time) float64 { return passage.At(at).Lon.Deg() })
			formula := 48 / math.Pi * (lat.Tan() - dec.Tan()) * (dDec - dLat) * math.Pow(900/turns, 2)
			got := item.Best.Sub(event).Seconds()
			if math.Abs(formula-got) > 2+0.02*math.Abs(got) && math.Abs(got) < 600 {
				t.Errorf("at %v: %.1f s after meridian passage, by the formula %.1f s", lat.Deg(), got, formula)
			}
			checked, longest = checked+1, math.Max(longest, math.Abs(got))
		}
	}
	t.Logf("%d noons, up to %.0f s from meridian passage", checked, longest)
	if checked < 50 {
		t.Errorf("%d noons, want 50 or more", checked)
	}
}

// Latitude found by the rule as it is worded, from the zenith distance and the
// declination printed, is the DR's at meridian passage: to 0.15', for
// three figures rounded to 0.1'. All cases: Sun north and south, same and
// contrary names, either the greater.
func TestNoonRuleGivesTheLatitude(t *testing.T) {
	form := regexp.MustCompile(`Sun (north|south) of the zenith; zenith distance (\d+)° ([\d.]+)' ([NS]), declination (\d+)° ([\d.]+)' ([NS]): (same|contrary)`)
	number := func(text string) float64 {
		x, err := strconv.ParseFloat(text, 64)
		if err != nil {
			t.Fatal(err)
		}
		return x
	}
	seen := map[string]bool{}
	rng := rand.New(rand.NewPCG(39, 40))
	for range 80 {
		_, p := oneDay(t, rng, 12)
		for _, item := range itemsOf(p, Noon) {
			m := form.FindStringSubmatch(strings.Join(item.Words, "\n"))
			if m == nil {
				continue
			}
			z, d, name := number(m[2])*60+number(m[3]), number(m[5])*60+number(m[6]), m[4]
			lat := z + d
			if m[8] == "contrary" {
				if lat = z - d; d > z {
					lat, name = d-z, m[7]
				}
			}
			if name == "S" {
				lat = -lat
			}
			if want := item.Fix.Lat.Min(); math.Abs(lat-want) > 0.15 {
				t.Errorf("%q gives %.1f', want %.1f'", m[0], lat, want)
			}
			if (m[1] == "north") == (m[4] == "N") {
				t.Errorf("%q: zenith distance named after the Sun's side", m[0])
			}
			seen[m[1]+" "+m[8]] = true
		}
	}
	if len(seen) != 4 {
		t.Errorf("cases %v, want all four", seen)
	}
}

func TestNoonWithoutSun(t *testing.T) {
	for _, c := range []struct {
		lat  float64
		want string
	}{{80, "The Sun does not rise"}, {60, "under the limit of 12°"}} {
		items := itemsOf(planOf(t, hovering(t, c.lat, 0, "2027-12-21T06:00:00Z", 0.5), DefaultSettings()), Noon)
		if len(items) != 1 || len(items[0].Sights) > 0 || !strings.Contains(items[0].Words[0], c.want) {
			t.Errorf("%v: %+v, want no sight and %q", c.lat, items, c.want)
		}
	}
	// The Sun within half a degree of the zenith.
	items := itemsOf(planOf(t, hovering(t, 23, 0, "2027-06-21T06:00:00Z", 0.5), DefaultSettings()), Noon)
	if text := strings.Join(items[0].Words, "\n"); !strings.Contains(text, "the bearing swings fast") || !strings.Contains(text, "Zn -8 min 0") {
		t.Errorf("overhead: %q", text)
	}
}

// No pair of minutes of the day gives a better running fix than the Sun lines
// chosen: all pairs tried, with the general formula.
func TestSunLinesAreTheBest(t *testing.T) {
	rng := rand.New(rand.NewPCG(33, 34))
	set := DefaultSettings()
	pairs, worst := 0, 0.0
	for range 100 {
		passage, p := oneDay(t, rng, 20*rng.Float64())
		s := newSky(passage, astro.DeltaT)
		for i := range p.Days {
			d := &p.Days[i]
			var lines []Item
			for _, item := range d.Programme {
				if item.Kind == SunLines {
					lines = append(lines, item)
				}
			}
			best := bruteSunLines(s, d, &set)
			if len(lines) == 0 {
				if !math.IsInf(best, 1) {
					t.Errorf("no Sun lines on %v, where a pair gives %.3f NM", d.Date, best)
				}
				continue
			}
			over := lines[0].ExpectedNM/best - 1
			pairs, worst = pairs+1, math.Max(worst, over)
			if over > 1e-6 {
				t.Errorf("%v: %.4f NM, another pair of minutes gives %.4f", d.Date, lines[0].ExpectedNM, best)
			}
		}
	}
	t.Logf("%d days with Sun lines, worst %.2g over the best pair", pairs, worst)
	if pairs < 60 {
		t.Errorf("%d days with Sun lines, want 60 or more", pairs)
	}
}

// bruteSunLines tries every second minute before noon with every second one
// after; where the Sun can be shot on one side only, every two in order.
func bruteSunLines(s *sky, d *Day, set *Settings) float64 {
	type minute struct {
		at     time.Time
		sailed float64
		zn     unit.Angle
		own    float64
	}
	var all []minute
	for at := d.From.Truncate(time.Minute).Add(time.Minute); at.Before(d.To); at = at.Add(2 * time.Minute) {
		fix := s.passage.At(at)
		hc, zn := s.ephemeris.Place(astro.Sun, at).From(fix.Lat, fix.Lon)
		if hc >= set.LowestAltitude && hc <= set.HighestAltitude {
			all = append(all, minute{at, s.passage.SailedNM(at), zn, set.sightError(hc).Min()})
		}
	}
	var noon time.Time
	for _, e := range d.Events {
		if e.Kind == MeridianPassage {
			noon = e.Time
		}
	}
	least := math.Inf(1)
	try := func(noon time.Time) {
		for i, a := range all {
			for _, b := range all[i+1:] {
				miles := b.sailed
				if !noon.IsZero() {
					if a.at.After(noon) || b.at.Before(noon) {
						continue
					}
					miles = s.passage.SailedNM(noon)
				}
				var sights []Sight
				for _, m := range []minute{a, b} {
					sights = append(sights, Sight{m.zn, unit.AngleFromMin(math.Hypot(m.own, set.RunError*math.Abs(m.sailed-miles)))})
				}
				least = math.Min(least, FixCovariance(sights, set.CommonError).ExpectedError())
			}
		}
	}
	if try(noon); math.IsInf(least, 1) && !noon.IsZero() {
		try(time.Time{})
	}
	return least
}

// Two lines at right angles, with errors of the run alone: the expected error is
// the root of the sum of their squares (the handbooks' rule for a running fix;
// 5 % of a run of 40 NM is 2 NM).
func TestRunningFixAtRightAngles(t *testing.T) {
	for _, c := range []struct{ runA, runB, want float64 }{{40, 0, 2}, {40, 30, 2.5}, {0, 100, 5}} {
		sights := []Sight{{0, unit.AngleFromMin(math.Max(0.05*c.runA, 1e-4))}, {unit.AngleFromDeg(90), unit.AngleFromMin(math.Max(0.05*c.runB, 1e-4))}}
		if got := FixCovariance(sights, 0).ExpectedError(); math.Abs(got-c.want) > 1e-3 {
			t.Errorf("runs of %v and %v NM: %.4f NM, want %v", c.runA, c.runB, got, c.want)
		}
	}
}

// Sun lines move with latitude and season: near the equator they are close to
// noon, in winter at 50° far from it. A ship of 12 kn, bound north.
func TestSunLinesMoveSensibly(t *testing.T) {
	hours := func(lat float64, date string) float64 {
		p, err := track.Ahead(track.PositionFromDeg(lat, 0), 0, 12, instant(t, date), 24*time.Hour)
		if err != nil {
			t.Fatal(err)
		}
		lines := itemsOf(planOf(t, p, DefaultSettings()), SunLines)
		if len(lines) != 2 {
			t.Fatalf("%v: %d lines, want 2", lat, len(lines))
		}
		return lines[1].Best.Sub(lines[0].Best).Hours()
	}
	tropic, temperate := hours(8, "2027-03-20T00:00:00Z"), hours(50, "2027-11-05T00:00:00Z")
	t.Logf("8° N in March %.1f h apart, 50° N in November %.1f h", tropic, temperate)
	if tropic > 0.75*temperate {
		t.Errorf("8° N in March %.1f h apart, 50° N in November %.1f h", tropic, temperate)
	}
}

// The best instants of Moon and Venus by day against a scan of every minute;
// and at none that is offered are limits broken.
func TestDayFixesAreTheBest(t *testing.T) {
	rng := rand.New(rand.NewPCG(35, 36))
	set := DefaultSettings()
	count := map[ItemKind]int{}
	for range 100 {
		passage, p := oneDay(t, rng, 15)
		s := newSky(passage, astro.DeltaT)
		for i := range p.Days {
			table := s.sunTable(&p.Days[i], &set)
			for _, item := range p.Days[i].Programme {
				body, ok := map[ItemKind]astro.Body{MoonLines: astro.Moon, PlanetLines: astro.Venus}[item.Kind]
				if !ok {
					continue
				}
				count[item.Kind]++
				if len(item.Sights) < 2 {
					continue
				}
				for at := item.Begin; !at.After(item.End); at = at.Add(time.Minute) {
					if x := table.fixError(body, table.minute(at)); x < item.ExpectedNM-1e-6 {
						t.Errorf("%s: %v gives %.4f NM, better than %.4f at %v", item.ID, at, x, item.ExpectedNM, item.Best)
						break
					}
				}
				sun, moon := item.Sights[0], item.Sights[1]
				if x := crossingAngle(sun.Azimuth, moon.Azimuth); x < leastCrossing || sun.Altitude < set.LowestAltitude || moon.Altitude > set.HighestAltitude {
					t.Errorf("%s: crossing %.1f°, altitudes %.1f° and %.1f°", item.ID, x.Deg(), sun.Altitude.Deg(), moon.Altitude.Deg())
				}
				if item.Kind == PlanetLines && (astro.Elongation(s.ephemeris.At(item.Best), astro.Venus) < venusElongation || moon.Altitude < venusAltitude) {
					t.Errorf("%s: Venus too near the Sun or too low", item.ID)
				}
			}
		}
	}
	t.Logf("%v", count)
	if count[MoonLines] < 20 || count[PlanetLines] < 20 {
		t.Errorf("%v, want 20 or more of each", count)
	}
}

// Any minute at which Moon and Sun can be shot and cross well lies in a span
// offered, unless the whole span is shorter than the search's ten minutes.
func TestDayFixesAreAllFound(t *testing.T) {
	rng := rand.New(rand.NewPCG(37, 38))
	set := DefaultSettings()
	for range 40 {
		passage, p := oneDay(t, rng, 15)
		s := newSky(passage, astro.DeltaT)
		for i := range p.Days {
			table, inARow := s.sunTable(&p.Days[i], &set), 0
			for m := range table.rows {
				covered := false
				for _, item := range p.Days[i].Programme {
					at := table.time(m)
					covered = covered || item.Kind == MoonLines && !at.Before(item.Begin) && !at.After(item.End)
				}
				if !covered && !math.IsInf(table.fixError(astro.Moon, m), 1) {
					inARow++
				} else {
					inARow = 0
				}
				if inARow > coarse {
					t.Fatalf("%v: Moon and Sun at %v are in no span", p.Days[i].Date, table.time(m))
				}
			}
		}
	}
}
