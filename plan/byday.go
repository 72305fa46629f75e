package plan

import (
	"fmt"
	"math"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

// How lines of Sun and Moon, or Sun and Venus, must cross to be of use.
var leastCrossing = unit.AngleFromDeg(30)

// Venus by day: how far from the Sun and how high it must stand to be found
// (common practice, no published source).
var (
	venusElongation = unit.AngleFromDeg(20)
	venusAltitude   = unit.AngleFromDeg(20)
)

// found is a span of minutes in which something can be done, with its best.
type found struct{ begin, best, end int }

// coarse is how many minutes lie between the times first looked at.
const coarse = 10

// spans finds the spans, of ten minutes or more, in which a cost by the minute
// is finite, and the minute in each with the least.
func spans(from, to int, cost func(int) float64) (all []found) {
	var open *found
	for i := from; i <= to; i += coarse {
		c := cost(i)
		switch {
		case math.IsInf(c, 1):
			open = nil
			continue
		case open == nil:
			all = append(all, found{i, i, i})
			open = &all[len(all)-1]
		case c < cost(open.best):
			open.best = i
		}
		open.end = i
	}
	for k := range all {
		all[k].narrow(from, to, cost)
	}
	return all
}

// narrow brings the ends and the best instant to a minute.
func (f *found) narrow(from, to int, cost func(int) float64) {
	for n := 1; n < coarse && f.begin > from && !math.IsInf(cost(f.begin-1), 1); n++ {
		f.begin--
	}
	for n := 1; n < coarse && f.end < to && !math.IsInf(cost(f.end+1), 1); n++ {
		f.end++
	}
	around, least := f.best, cost(f.best)
	for i := max(around-coarse, f.begin); i <= min(around+coarse, f.end); i++ {
		if c := cost(i); c < least {
			f.best, least = i, c
		}
	}
}

// withSun is the sights of the Sun and another body at one minute, and whether
// both can be shot and their lines cross well.
func (t *sunTable) withSun(b astro.Body, i int) (sights [2]Sight, ok bool) {
	if !t.usable(i) {
		return sights, false
	}
	fix := t.at(i).fix
	hc, zn := t.sky.ephemeris.Place(b, t.time(i)).From(fix.Lat, fix.Lon)
	if hc < t.set.LowestAltitude || hc > t.set.HighestAltitude {
		return sights, false
	}
	sights = [2]Sight{t.sight(i), {zn, t.set.sightError(hc)}}
	return sights, crossingAngle(sights[0].Azimuth, sights[1].Azimuth) >= leastCrossing
}

// fixError is the expected error of the fix by the Sun and another body,
// endless where there is none.
func (t *sunTable) fixError(b astro.Body, i int) float64 {
	sights, ok := t.withSun(b, i)
	if !ok {
		return math.Inf(1)
	}
	both := sights[0].information().add(sights[1].information())
	return math.Sqrt(both.square(commonWeight(t.set.CommonError)))
}

// moonLines are the spans of a day in which Sun and Moon can be shot together.
func (t *sunTable) moonLines() []Item {
	var items []Item
	for _, f := range spans(0, len(t.rows)-1, func(i int) float64 { return t.fixError(astro.Moon, i) }) {
		item := t.dayFix(MoonLines, astro.Moon, f)
		item.Title = "Moon and Sun"
		if lit := t.sky.ephemeris.Place(astro.Moon, item.Best).Illuminated; lit < 0.15 {
			item.Words = append(item.Words, fmt.Sprintf("Only %.0f %% of the Moon is lit: hard to see by day", 100*lit))
		}
		items = append(items, item)
	}
	return items
}

// dayFix is an item of two sights, the Sun's and another body's, at once.
func (t *sunTable) dayFix(kind ItemKind, b astro.Body, f found) Item {
	s, set, best := t.sky, t.set, t.time(f.best)
	item := Item{Kind: kind, Begin: t.time(f.begin), Best: best, End: t.time(f.end), Fix: s.passage.At(best)}
	c := set.candidate(s.ephemeris.At(best), b, item.Fix.Position)
	item.Sights = []RoundSight{s.sight(&c, best, set)}
	sights, ok := t.withSun(b, f.best)
	if !ok {
		return item
	}
	item.Sights = append([]RoundSight{s.sight(&Candidate{Body: astro.Sun, Limb: astro.Lower}, best, set)}, item.Sights...)
	q := set.quality([]astro.Body{astro.Sun, b}, sights[:])
	item.Quality, item.ExpectedNM = &q, q.Covariance.ExpectedError()
	item.Words = append(item.Words, fmt.Sprintf("Lines cross at %.0f°: expected error %.2f NM, 95 %% ellipse %s",
		crossingAngle(sights[0].Azimuth, sights[1].Azimuth).Deg(), item.ExpectedNM, q.Covariance.Ellipse()))
	if c.EitherLimb {
		item.Words = append(item.Words, fmt.Sprintf("Either limb of the Moon is full; the preset is for the %v one", c.Limb))
	}
	return item
}

// planetLines are the spans of a day in which Venus can be found in the
// telescope: best where its line crosses the Sun's well, or else where it
// stands highest.
func (t *sunTable) planetLines() []Item {
	if len(t.rows) == 0 {
		return nil
	}
	clear := max(venusElongation, t.set.SunClearance)
	noon := astro.Elongation(t.sky.ephemeris.At(t.time(len(t.rows)/2)), astro.Venus)
	if noon < clear-unit.AngleFromDeg(1) { // it changes by a degree a day
		return nil
	}
	near := noon < clear+unit.AngleFromDeg(1)
	cost := func(i int) float64 {
		r := t.at(i)
		if r.altitude < sunriseAltitude {
			return math.Inf(1)
		}
		hc, _ := t.sky.ephemeris.Place(astro.Venus, t.time(i)).From(r.fix.Lat, r.fix.Lon)
		if hc < venusAltitude || hc > t.set.HighestAltitude || near && astro.Elongation(t.sky.ephemeris.At(t.time(i)), astro.Venus) < clear {
			return math.Inf(1)
		}
		return min(t.fixError(astro.Venus, i), 1000-hc.Deg()) // or a line alone
	}
	var items []Item
	for _, f := range spans(0, len(t.rows)-1, cost) {
		item := t.dayFix(PlanetLines, astro.Venus, f)
		item.Title = "Venus by day"
		at := t.sky.ephemeris.At(item.Best)
		item.Words = append(item.Words,
			fmt.Sprintf("Set the preset, look along the bearing; magnitude %.1f, %.0f° from the Sun", at.Place(astro.Venus).Magnitude, astro.Elongation(at, astro.Venus).Deg()),
			"Never sweep the telescope near the Sun; put the shades in between")
		items = append(items, item)
	}
	return items
}
