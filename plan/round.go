package plan

import (
	"cmp"
	"math"
	"slices"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// RoundSight is one sight of a round, with all values at its own time and DR
// position.
type RoundSight struct {
	Body     astro.Body
	Time     time.Time // UTC, to a whole second
	Fix      track.Fix
	Altitude unit.Angle // Hc
	Azimuth  unit.Angle // Zn
	Relative unit.Angle // bearing from the bow, clockwise, [0°, 360°)
	Preset   unit.Angle
	Limb     astro.Limb
	Rate     unit.Angle // change of altitude in a minute, ship's way included
	Late     unit.Angle // preset five minutes later
	Error    unit.Angle // standard error of the sight
}

// late is how much later than planned the second preset is for.
const late = 5 * time.Minute

// FixQuality is what fix a set of sights will give.
type FixQuality struct {
	Bodies                []astro.Body
	LeastGap, GreatestGap unit.Angle
	Covariance            Covariance
	Ratio                 float64 // expected error to the least that so many sights can have, 2 s/√n
}

// quality works out the fix from sights of the bodies named.
func (set *Settings) quality(bodies []astro.Body, sights []Sight) FixQuality {
	q := FixQuality{Bodies: bodies, Covariance: FixCovariance(sights, set.CommonError)}
	var azimuths []unit.Angle
	mean := 0.0
	for _, g := range sights {
		azimuths = append(azimuths, g.Azimuth)
		mean += 1 / (g.Error.Min() * g.Error.Min())
	}
	q.LeastGap, q.GreatestGap = Gaps(azimuths...)
	// n sights of weight 1/s² each, evenly spaced, have 2 s/√n = 2/√(Σ 1/s²).
	q.Ratio = q.Covariance.ExpectedError() / (2 / math.Sqrt(mean))
	return q
}

// round chooses the sights of a window.
func (s *sky) round(w *Window, set *Settings) []RoundSight {
	c := set.chooser(w.Bodies)
	chosen := c.choose(set.Sights)
	order, earliest, ok := c.order(chosen, c.prefixCost(chosen))
	if !ok {
		return nil
	}
	var round []RoundSight
	for i, t := range c.schedule(order, earliest, w.Best) {
		round = append(round, s.sight(&w.Bodies[order[i]], t.Round(time.Second), set))
	}
	return round
}

// sight works out one sight for its own time.
func (s *sky) sight(c *Candidate, t time.Time, set *Settings) RoundSight {
	preset := func(t time.Time) (track.Fix, unit.Angle, unit.Angle, unit.Angle) {
		fix := s.passage.At(t)
		p := s.ephemeris.Place(c.Body, t)
		hc, zn := p.From(fix.Lat, fix.Lon)
		return fix, hc, zn, set.Preset(hc, p, c.Limb)
	}
	r := RoundSight{Body: c.Body, Time: t, Limb: c.Limb}
	r.Fix, r.Altitude, r.Azimuth, r.Preset = preset(t)
	r.Relative = (r.Azimuth - r.Fix.Course).Mod1()
	_, after, _, _ := preset(t.Add(time.Minute))
	r.Rate = after - r.Altitude
	_, _, _, r.Late = preset(t.Add(late))
	r.Error = set.sightError(r.Altitude)
	return r
}

// bestPair finds the two candidates that give the best fix.
func (set *Settings) bestPair(bodies []Candidate) (best FixQuality, ok bool) {
	parts, weight, least := informations(bodies), commonWeight(set.CommonError), math.Inf(1)
	var a, b *Candidate
	for i := range parts {
		for j := range i {
			both := parts[i].add(parts[j])
			if x := both.square(weight); x < least {
				least, a, b = x, &bodies[j], &bodies[i]
			}
		}
	}
	if a == nil {
		return best, false
	}
	return set.quality([]astro.Body{a.Body, b.Body}, []Sight{{a.Azimuth, a.Error}, {b.Azimuth, b.Error}}), true
}

// usable gives the longest part of a window in which at least three bodies can
// be shot. ok is false where there is none.
func usable(bodies []Candidate) (begin, end time.Time, ok bool) {
	type mark struct {
		time time.Time
		step int // how many bodies come or go
	}
	var marks []mark
	for _, c := range bodies {
		marks = append(marks, mark{c.From, 1}, mark{c.To, -1})
	}
	slices.SortStableFunc(marks, func(a, b mark) int {
		return cmp.Or(a.time.Compare(b.time), b.step-a.step)
	})
	up := 0
	var from time.Time
	for _, m := range marks {
		before := up
		up += m.step
		if before < 3 && up >= 3 {
			from = m.time
		}
		if before >= 3 && up < 3 && m.time.Sub(from) > end.Sub(begin) {
			begin, end, ok = from, m.time, true
		}
	}
	return begin, end, ok
}

// fill works out what can be shot in a window whose times are known.
func (s *sky) fill(w *Window, set *Settings) {
	at := s.ephemeris.At(w.Best)
	l := set.lookout(at, w.Best, w.Fix)
	w.SunAzimuth = l.sun.Azimuth
	w.Bodies = s.visible(w, set, set.candidates(at, w.Fix.Position))
	w.Triads = set.triads(w.Bodies)
	w.Warnings = warnings(w.Bodies, at.Place(astro.Moon), &l)
	if begin, end, ok := usable(w.Bodies); ok {
		w.Usable = [2]time.Time{begin, end}
	}
	w.PairFix, _ = set.bestPair(w.Bodies)
	w.Round = s.round(w, set)
	var sights []Sight
	var bodies []astro.Body
	for _, r := range w.Round {
		sights, bodies = append(sights, Sight{r.Azimuth, r.Error}), append(bodies, r.Body)
	}
	if len(sights) > 0 {
		w.RoundFix = set.quality(bodies, sights)
	}
}
