package plan

import (
	"cmp"
	"math"
	"slices"
	"time"
)

// option is a candidate as the choice of a round sees it.
type option struct {
	information
	from, to time.Time
}

// chooser picks the bodies of a round.
type chooser struct {
	options []option
	scaled  []information // the options', as the quick measure counts them
	common  float64       // weight of the error common to the sights
	prior   information
	loss    float64
	pace    time.Duration
	buffer  []exchange
	own     outcomes   // of the set last measured
	left    []outcomes // see climb
}

func (set *Settings) chooser(bodies []Candidate) *chooser {
	weight := 1 / (set.DRError * set.DRError)
	c := &chooser{
		common: commonWeight(set.CommonError), loss: set.Loss, pace: set.Pace,
		prior: information{cc: weight, ss: weight},
	}
	for _, b := range bodies {
		o := option{Sight{b.Azimuth, b.Error}.information(), b.From, b.To}
		c.options = append(c.options, o)
		c.scaled = append(c.scaled, o.information.scale(1-set.Loss))
	}
	return c
}

// outcomes are what may be left of a set of sights when each may be lost, with
// the chance of each.
type outcomes struct {
	left   []information
	chance []float64
	mean   float64 // expected error, NM
}

// outcomes works out those of a set, in the storage of what was worked out
// before. The DR position counts as a sight of its own with the standard error
// of Settings.DRError north and east. So with no line left the error is √2 of
// that, with one line little less: this is what fewer than two lines cost.
func (c *chooser) outcomes(set []int, o outcomes) outcomes {
	o.left, o.chance = append(o.left[:0], c.prior), append(o.chance[:0], 1)
	for _, i := range set {
		for k, n := 0, len(o.left); k < n; k++ {
			if c.loss > 0 {
				o.left, o.chance = append(o.left, o.left[k]), append(o.chance, o.chance[k]*c.loss)
			}
			o.left[k], o.chance[k] = o.left[k].add(c.options[i].information), o.chance[k]*(1-c.loss)
		}
	}
	o.mean = c.meanWith(&o, information{})
	return o
}

// meanWith is the mean over outcomes of the expected error when something more
// is known.
func (c *chooser) meanWith(o *outcomes, more information) (mean float64) {
	for k, chance := range o.chance {
		sum := o.left[k].add(more)
		mean += chance * math.Sqrt(sum.square(c.common))
	}
	return mean
}

// criterion is the expected error of the fix, in NM, when each sight may be
// lost: the mean over all that may be left.
func (c *chooser) criterion(set []int) float64 {
	c.own = c.outcomes(set, c.own)
	return c.own.mean
}

// quick is a stand-in for the square of the criterion, a hundred times cheaper:
// that of the error when every sight counts for the part of it that is kept on
// average. It takes the information of the set, so scaled, and the prior.
func (c *chooser) quick(sum *information) float64 { return sum.square(c.common) }

func (a information) scale(f float64) information {
	return information{a.cc * f, a.cs * f, a.ss * f, a.c * f, a.s * f, a.w * f}
}

// How much the search does, found by trial against searches of all sets: starts
// of the quick climb (about), the best of its sets that the criterion climbs on
// from, and exchanges that the criterion looks at in one step.
const (
	climbs = 4
	tops   = 3
	looked = 12
)

// choose picks up to n options: the set with the least criterion that can be
// shot one after the other. It climbs by adding and exchanging bodies, first
// by the quick measure, then by the criterion. Sets are kept sorted.
func (c *chooser) choose(n int) []int {
	type start struct {
		set   []int
		quick float64
	}
	var starts []start
	for i := 0; i < len(c.options); i += 1 + len(c.options)/climbs {
		set, quick := c.climbQuick([]int{i}, n)
		if !slices.ContainsFunc(starts, func(s start) bool { return slices.Equal(s.set, set) }) {
			starts = append(starts, start{set, quick})
		}
	}
	slices.SortStableFunc(starts, func(a, b start) int { return cmp.Compare(a.quick, b.quick) })
	var best []int
	least := math.Inf(1)
	for _, s := range starts[:min(len(starts), tops)] {
		set := c.climb(s.set, n)
		if x := c.criterion(set); x < least {
			best, least = set, x
		}
	}
	return best
}

// exchange puts an option into a set for the one at a place of it, or beside
// all where out is -1; quick is the measure of what comes of it.
type exchange struct {
	in, out int
	quick   float64
}

// exchanges lists all exchanges of a set of at most n; the list is good until
// the next call.
func (c *chooser) exchanges(set []int, n int) []exchange {
	all := c.buffer[:0]
	sum := c.prior
	for _, i := range set {
		sum = sum.add(c.scaled[i])
	}
	add := func(out int, rest information) {
		for i := range c.options {
			if !slices.Contains(set, i) {
				with := rest.add(c.scaled[i])
				all = append(all, exchange{i, out, c.quick(&with)})
			}
		}
	}
	if len(set) < n {
		add(-1, sum)
	}
	for k, out := range set {
		add(k, sum.add(c.scaled[out].scale(-1)))
	}
	c.buffer = all
	return all
}

// likeliest keeps the best few exchanges by the quick measure, the best first.
func likeliest(all []exchange) []exchange {
	n := 0
	for _, x := range all {
		if n == looked && x.quick >= all[n-1].quick {
			continue
		}
		i := min(n, looked-1)
		for ; i > 0 && x.quick < all[i-1].quick; i-- {
			all[i] = all[i-1]
		}
		all[i] = x
		n = min(n+1, looked)
	}
	return all[:n]
}

// climbQuick betters a set by the best addition or exchange until none helps,
// by the quick measure.
func (c *chooser) climbQuick(set []int, n int) (_ []int, least float64) {
	least = math.Inf(1)
	for {
		var better []int
		for _, x := range c.exchanges(set, n) {
			if x.quick < least-1e-9 {
				if next := insert(set, x); c.feasible(next) {
					better, least = next, x.quick
				}
			}
		}
		if better == nil {
			return set, least
		}
		set = better
	}
}

// climb does the same by the criterion, of those exchanges that the quick
// measure likes best. What may be left of the sights that stay is worked out
// once for each that goes.
func (c *chooser) climb(set []int, n int) []int {
	least := c.criterion(set)
	if c.left == nil {
		c.left = make([]outcomes, n+1)
	}
	for {
		var better []int
		done := make([]bool, n+1)
		for _, x := range likeliest(c.exchanges(set, n)) {
			stay := &c.left[x.out+1]
			if !done[x.out+1] {
				*stay, done[x.out+1] = c.outcomes(without(set, x.out), *stay), true
			}
			m := c.loss*stay.mean + (1-c.loss)*c.meanWith(stay, c.options[x.in].information)
			if m < least-1e-9 {
				if next := insert(set, x); c.feasible(next) {
					better, least = next, m
				}
			}
		}
		if better == nil {
			return set
		}
		set = better
	}
}

// without is a set less the one at a place of it, or all where that is -1.
func without(set []int, place int) []int {
	rest := make([]int, 0, len(set)+1)
	for k, i := range set {
		if k != place {
			rest = append(rest, i)
		}
	}
	return rest
}

// insert is a set after an exchange.
func insert(set []int, x exchange) []int {
	next := without(set, x.out)
	at, _ := slices.BinarySearch(next, x.in)
	return slices.Insert(next, at, x.in)
}
