package plan

import (
	"math"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

// MoonlitStars is the kind of a window under the Moon at night.
const MoonlitStars WindowKind = "moonlit-stars"

// How a moonlit horizon is used: the Moon half lit or more and ten degrees up
// or more, sights of half an hour round the best instant, twice the usual error.
const (
	moonlitPart   = 0.5
	moonlitLength = 30 * time.Minute
	moonlitError  = 2
)

// moonlitArc is how far from the Moon's bearing the horizon is looked for.
var moonlitArc = unit.AngleFromDeg(90)

// moonlit are the spans of a day's night in which the Moon may show a horizon,
// each with a round towards its side. Best is where it stands highest below the
// altitude at which its glitter no longer reaches the horizon.
func (t *sunTable) moonlit() []Item {
	s, set := t.sky, t.set
	cost := func(i int) float64 {
		r := t.at(i)
		if r.altitude > set.LowerSun {
			return math.Inf(1)
		}
		moon := s.ephemeris.Place(astro.Moon, t.time(i))
		hc, _ := moon.From(r.fix.Lat, r.fix.Lon)
		if hc < moonlitAltitude || moon.Illuminated < moonlitPart {
			return math.Inf(1)
		}
		return math.Abs(hc.Deg() - 30)
	}
	var items []Item
	for _, f := range spans(0, len(t.rows)-1, cost) {
		begin, best, end := t.time(f.begin), t.time(f.best), t.time(f.end)
		w := s.moonlitWindow(begin, best, end, set)
		if len(w.Bodies) == 0 {
			continue
		}
		items = append(items, Item{
			Kind: Moonlit, Title: w.Title(), Begin: begin, Best: best, End: end, Fix: w.Fix, Window: w, Sights: w.Round,
			Quality: &w.RoundFix, ExpectedNM: finite(w.RoundFix.Covariance.ExpectedError()),
			Words: []string{
				"Doubtful: under the Moon the horizon can be false, its glitter ends short of it",
				"Errors are counted twice; bodies on the Moon's side are taken; check against another fix",
			},
		})
	}
	return items
}

// finite is a number, or nothing where it is endless.
func finite(x float64) float64 {
	if math.IsInf(x, 0) || math.IsNaN(x) {
		return 0
	}
	return x
}

func (s *sky) moonlitWindow(begin, best, end time.Time, set *Settings) *Window {
	own := *set
	own.SightError, own.CommonError = set.SightError.Mul(moonlitError), set.CommonError.Mul(moonlitError)
	_, _, zn := s.place(astro.Moon, best)
	own.Clouds = append([]Arc{{(zn + moonlitArc).Mod1(), (zn - moonlitArc).Mod1()}}, set.Clouds...)
	w := &Window{
		Kind: MoonlitStars, Best: best, Fix: s.passage.At(best),
		Begin: laterOf(begin, best.Add(-moonlitLength/2)), End: earlierOf(end, best.Add(moonlitLength/2)),
	}
	if !w.End.After(w.Begin) {
		return w
	}
	s.fill(w, &own)
	return w
}
