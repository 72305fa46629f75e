package plan

import (
	"math"
	"time"
)

// crossing is an instant at which a function of time passes through zero.
type crossing struct {
	time   time.Time
	rising bool
}

// shortest is the shortest span the search looks into. Two crossings nearer
// to each other than that pass for a touch, which is no crossing.
const shortest = 50 * time.Millisecond

// rootPrecision is how near a crossing is found.
const rootPrecision = time.Millisecond

// crossings finds every zero of f between a and b, in order, except pairs
// closer than 50 ms. bend is a bound on the second derivative of f, per hour
// squared.
//
// None can be missed: over a span w, f strays from its chord by at most
// bend w²/8, and its slope from the chord's by at most bend w/2. So a span
// whose ends lie on one side, both farther from zero than that, holds no
// crossing; one whose ends lie on either side, with a chord steeper than that,
// holds exactly one. Any other span is halved and looked at again.
func crossings(f func(time.Time) float64, a, b time.Time, bend float64) []crossing {
	s := search{f: f, bend: bend}
	s.span(a, b, f(a), f(b))
	return apart(s.found)
}

// apart drops the pairs of crossings closer than shortest.
func apart(all []crossing) []crossing {
	var kept []crossing
	for _, c := range all {
		if n := len(kept); n > 0 && c.time.Sub(kept[n-1].time) < shortest {
			kept = kept[:n-1]
			continue
		}
		kept = append(kept, c)
	}
	return kept
}

type search struct {
	f     func(time.Time) float64
	bend  float64
	found []crossing
}

func (s *search) span(a, b time.Time, fa, fb float64) {
	w := b.Sub(a)
	hours := w.Hours()
	same := (fa >= 0) == (fb >= 0)
	switch {
	case same && math.Min(math.Abs(fa), math.Abs(fb)) > s.bend*hours*hours/8:
		return
	case !same && math.Abs(fb-fa) > s.bend*hours*hours/2:
		s.found = append(s.found, crossing{root(s.f, a, b, fa, fb), fb >= 0})
		return
	case w <= shortest:
		if !same {
			s.found = append(s.found, crossing{a.Add(w / 2), fb >= 0})
		}
		return
	}
	mid := a.Add(w / 2)
	fm := s.f(mid)
	s.span(a, mid, fa, fm)
	s.span(mid, b, fm, fb)
}

// root finds the one zero between a and b, where f has different signs, by
// false position; an end that stays twice has its weight halved (the Illinois
// rule).
func root(f func(time.Time) float64, a, b time.Time, fa, fb float64) time.Time {
	stayed := 0
	for b.Sub(a) > rootPrecision {
		step := time.Duration(float64(b.Sub(a)) * fa / (fa - fb))
		t := a.Add(min(max(step, rootPrecision/2), b.Sub(a)-rootPrecision/2))
		ft := f(t)
		if (ft >= 0) == (fb >= 0) {
			b, fb = t, ft
			if stayed < 0 {
				fa /= 2
			}
			stayed = -1
		} else {
			a, fa = t, ft
			if stayed > 0 {
				fb /= 2
			}
			stayed = 1
		}
	}
	return a.Add(b.Sub(a) / 2)
}
