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
	common  float64       // standard error common to the sights, minutes
	prior   information
	loss    float64
	pace    time.Duration
	buffer  []exchange
}

func (set *Settings) chooser(bodies []Candidate) *chooser {
	weight := 1 / (set.DRError * set.DRError)
	c := &chooser{
		common: set.CommonError.Min(), loss: set.Loss, pace: set.Pace,
		prior: information{cc: weight, ss: weight},
	}
	for _, b := range bodies {
		o := option{Sight{b.Azimuth, b.Error}.information(), b.From, b.To}
		c.options = append(c.options, o)
		c.scaled = append(c.scaled, o.information.scale(1-set.Loss))
	}
	return c
}

// criterion is the expected error of the fix, in NM, when each sight may be
// lost: the mean of √trace P over all that may be left, each weighted by its
// chance. The DR position counts as a sight of its own with the standard error
// of Settings.DRError north and east. So with no line left the error is √2 of
// that, with one line little less: this is what fewer than two lines cost.
func (c *chooser) criterion(set []int) float64 { return c.mean(set, c.prior) }

func (c *chooser) mean(set []int, sum information) float64 {
	if len(set) == 0 {
		return sum.covariance(c.common).ExpectedError()
	}
	rest := set[1:]
	kept := (1 - c.loss) * c.mean(rest, sum.add(c.options[set[0]].information))
	if c.loss == 0 {
		return kept
	}
	return kept + c.loss*c.mean(rest, sum)
}

// quick is a stand-in for the criterion, a hundred times cheaper: the error
// when every sight counts for the part of it that is kept on average. It takes
// the information of the set, so scaled.
func (c *chooser) quick(sum information) float64 {
	return sum.add(c.prior).covariance(c.common).ExpectedError()
}

func (a information) scale(f float64) information {
	return information{a.cc * f, a.cs * f, a.ss * f, a.c * f, a.s * f, a.w * f}
}

// How much the search does, found by trial against searches of all sets: starts
// of the quick climb (about), the best of its sets that the criterion climbs on
// from, and exchanges that the criterion looks at in one step.
const (
	climbs = 6
	tops   = 3
	looked = 16
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
	var sum information
	for _, i := range set {
		sum = sum.add(c.scaled[i])
	}
	for i := range c.options {
		if slices.Contains(set, i) {
			continue
		}
		with := sum.add(c.scaled[i])
		if len(set) < n {
			all = append(all, exchange{i, -1, c.quick(with)})
		}
		for k, out := range set {
			all = append(all, exchange{i, k, c.quick(with.add(c.scaled[out].scale(-1)))})
		}
	}
	c.buffer = all
	return all
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
// measure likes best.
func (c *chooser) climb(set []int, n int) []int {
	least := c.criterion(set)
	for {
		all := c.exchanges(set, n)
		slices.SortFunc(all, func(a, b exchange) int {
			return cmp.Or(cmp.Compare(a.quick, b.quick), cmp.Compare(a.in, b.in), cmp.Compare(a.out, b.out))
		})
		var better []int
		for _, x := range all[:min(len(all), looked)] {
			next := insert(set, x)
			if m := c.criterion(next); m < least-1e-9 && c.feasible(next) {
				better, least = next, m
			}
		}
		if better == nil {
			return set
		}
		set = better
	}
}

// insert is a set after an exchange.
func insert(set []int, x exchange) []int {
	next := make([]int, 0, len(set)+1)
	for k, i := range set {
		if k != x.out {
			next = append(next, i)
		}
	}
	at, _ := slices.BinarySearch(next, x.in)
	return slices.Insert(next, at, x.in)
}
