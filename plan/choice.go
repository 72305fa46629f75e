package plan

import (
	"cmp"
	"math"
	"math/bits"
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

// choose picks up to n options: the set with the least criterion that can be
// shot one after the other. It climbs by adding and exchanging bodies, first
// by the quick measure from some ten bodies as starts, then by the criterion
// from the two best of the sets so found.
func (c *chooser) choose(n int) []int {
	type start struct {
		set   []int
		quick float64
	}
	var starts []start
	for i := 0; i < len(c.options); i += 1 + len(c.options)/climbs {
		set, quick := c.climbQuick(i, n)
		if !slices.ContainsFunc(starts, func(s start) bool { return slices.Equal(s.set, set) }) {
			starts = append(starts, start{set, quick})
		}
	}
	slices.SortStableFunc(starts, func(a, b start) int { return cmp.Compare(a.quick, b.quick) })
	var best []int
	least := math.Inf(1)
	for _, s := range starts[:min(len(starts), 3)] {
		set := c.climb(s.set, n)
		if x := c.criterion(set); x < least {
			best, least = set, x
		}
	}
	return best
}

// climbs is how many starts the quick climb has, about; looked is how many
// exchanges the criterion looks at in one step.
const (
	climbs = 6
	looked = 16
)

// climbQuick climbs from one body by the quick measure.
func (c *chooser) climbQuick(first, n int) (set []int, least float64) {
	set, sum := []int{first}, c.scaled[first]
	least = c.quick(sum)
	next := make([]int, 0, n+1)
	for {
		var better []int
		betterSum := sum
		try := func(i, out int, total information) {
			if x := c.quick(total); x < least-1e-9 {
				if next = insert(next, set, i, out); c.feasible(next) {
					better, betterSum, least = slices.Clone(next), total, x
				}
			}
		}
		for i := range c.options {
			if slices.Contains(set, i) {
				continue
			}
			with := sum.add(c.scaled[i])
			if len(set) < n {
				try(i, -1, with)
			}
			for k, out := range set {
				try(i, k, with.add(c.scaled[out].scale(-1)))
			}
		}
		if better == nil {
			return set, least
		}
		set, sum = better, betterSum
	}
}

// climb betters a set by the best addition or exchange until none helps, by the
// criterion. Of all exchanges it looks at those that the quick measure likes
// best. Sets are kept sorted.
func (c *chooser) climb(set []int, n int) []int {
	type exchange struct {
		in, out int
		quick   float64
	}
	least := c.criterion(set)
	for {
		var all []exchange
		sum := c.scaledSum(set)
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
		slices.SortStableFunc(all, func(a, b exchange) int { return cmp.Compare(a.quick, b.quick) })
		var better []int
		for _, x := range all[:min(len(all), looked)] {
			next := insert(nil, set, x.in, x.out)
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

func (c *chooser) scaledSum(set []int) (sum information) {
	for _, i := range set {
		sum = sum.add(c.scaled[i])
	}
	return sum
}

// insert puts option i into a copy of a sorted set, leaving out one place of
// it where out is not negative.
func insert(into, set []int, i, out int) []int {
	into = into[:0]
	for k, x := range set {
		if k != out {
			into = append(into, x)
		}
	}
	at, _ := slices.BinarySearch(into, i)
	return slices.Insert(into, at, i)
}

// feasible tells whether the options can be shot one after the other: in the
// order of fading, or else in any.
func (c *chooser) feasible(set []int) bool {
	byEnd := slices.Clone(set)
	slices.SortFunc(byEnd, func(i, j int) int { return c.options[i].to.Compare(c.options[j].to) })
	var at time.Time
	for k, i := range byEnd {
		o := &c.options[i]
		if k > 0 {
			at = at.Add(c.pace)
		}
		if at = laterOf(at, o.from); at.After(o.to) {
			_, _, ok := c.order(set, func(uint) float64 { return 0 })
			return ok
		}
	}
	return true
}

// order finds the cheapest order in which the options can be shot, each within
// its span and no sooner than the pace allows after the one before. The cost of
// an order is the sum of the cost of what has been shot after each sight,
// and of inversion for each pair in which what fades later comes first. earliest
// gives the earliest time of each sight.
func (c *chooser) order(set []int, cost func(shot uint) float64) (order []int, earliest []time.Time, ok bool) {
	type state struct {
		cost float64
		time time.Time
		last int
		ok   bool
	}
	n := len(set)
	states := make([]state, 1<<n)
	states[0].ok = true
	for shot := uint(1); shot < 1<<n; shot++ {
		own := cost(shot)
		best := &states[shot]
		for k := range n {
			before := states[shot&^(1<<k)]
			if shot>>k&1 == 0 || !before.ok {
				continue
			}
			o := c.options[set[k]]
			at := o.from
			if shot != 1<<k {
				at = laterOf(at, before.time.Add(c.pace))
			}
			if at.After(o.to) {
				continue
			}
			next := state{before.cost + own, at, k, true}
			for j := range n {
				if j != k && shot>>j&1 == 1 && c.options[set[j]].to.After(o.to) {
					next.cost += inversion
				}
			}
			if !best.ok || next.cost < best.cost-1e-12 || next.cost < best.cost+1e-12 && next.time.Before(best.time) {
				*best = next
			}
		}
	}
	shot := uint(1)<<n - 1
	if !states[shot].ok {
		return nil, nil, false
	}
	order, earliest = make([]int, n), make([]time.Time, n)
	for i := n - 1; i >= 0; i-- {
		k := states[shot].last
		order[i], earliest[i] = set[k], states[shot].time
		shot &^= 1 << k
	}
	return order, earliest, true
}

// inversion is what a pair out of the order of fading costs, in NM: enough that
// order follows fading, unless the first three lines would cross badly.
const inversion = 0.03

// prefixCost is the expected error of the sights shot so far, from the third
// on, so that an order is liked whose every beginning is a decent fix.
func (c *chooser) prefixCost(set []int) func(uint) float64 {
	return func(shot uint) float64 {
		if bits.OnesCount(shot) < 3 {
			return 0
		}
		sum := c.prior
		for k, i := range set {
			if shot>>k&1 == 1 {
				sum = sum.add(c.options[i].information)
			}
		}
		return sum.covariance(c.common).ExpectedError()
	}
}

// schedule gives each sight of an order its time: about the middle of the round
// at best, no sooner than it can be and no later than those after it allow.
func (c *chooser) schedule(order []int, earliest []time.Time, best time.Time) []time.Time {
	n := len(order)
	latest := make([]time.Time, n)
	for i := n - 1; i >= 0; i-- {
		latest[i] = c.options[order[i]].to
		if i+1 < n {
			latest[i] = earlierOf(latest[i], latest[i+1].Add(-c.pace))
		}
	}
	times := make([]time.Time, n)
	first := best.Add(-c.pace * time.Duration(n-1) / 2)
	for i := range times {
		times[i] = earlierOf(laterOf(first.Add(time.Duration(i)*c.pace), earliest[i]), latest[i])
	}
	return times
}
