package plan

import (
	"math/bits"
	"slices"
	"time"
)

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
