package plan

import (
	"math"
	"slices"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// Why a body cannot be shot at an instant.
const (
	tooLow      = "too low"
	tooHigh     = "too high"
	leftOut     = "left out"
	behindBlind = "behind the blind arc"
	underCloud  = "under cloud"
	tooFaint    = "too faint yet"
	noHorizon   = "no horizon under it"
)

// lookout is the sky and the horizon as they are seen at an instant.
type lookout struct {
	set       *Settings
	fix       track.Fix
	air       astro.Air
	sun, moon astro.Light
	moonlit   bool // the Moon keeps the horizon usable
}

// moonlitAltitude is how high a Moon more than half lit must stand to keep the
// horizon usable.
var moonlitAltitude = unit.AngleFromDeg(10)

func (set *Settings) lookout(sky astro.Sky, t time.Time, fix track.Fix) lookout {
	l := lookout{set: set, fix: fix, air: astro.NewAir(set.TemperatureC, set.Humidity, fix.Lat, t)}
	moon := sky.Place(astro.Moon)
	l.sun.Altitude, l.sun.Azimuth = sky.Place(astro.Sun).From(fix.Lat, fix.Lon)
	l.moon.Altitude, l.moon.Azimuth = moon.From(fix.Lat, fix.Lon)
	l.moon.Phase = unit.Angle(math.Acos(min(max(2*moon.Illuminated-1, -1), 1)))
	l.moonlit = moon.Illuminated > 0.5 && l.moon.Altitude > moonlitAltitude
	return l
}

// hidden tells why a body cannot be shot, or nothing where it can.
func (l *lookout) hidden(b astro.Body, magnitude float64, hc, zn unit.Angle) string {
	switch {
	case slices.Contains(l.set.Without, b):
		return leftOut
	case hc < l.set.LowestAltitude:
		return tooLow
	case hc > l.set.HighestAltitude:
		return tooHigh
	case within(l.set.Blind, zn-l.fix.Course):
		return behindBlind
	case within(l.set.Clouds, zn):
		return underCloud
	case !l.horizon(zn):
		return noHorizon
	case b != astro.Sun && b != astro.Moon && magnitude > l.faintest(hc, zn): // last, being dear
		return tooFaint
	}
	return ""
}

// faintest is the magnitude of the faintest body the telescope finds in a
// direction.
func (l *lookout) faintest(hc, zn unit.Angle) float64 {
	return l.air.LimitingMagnitude(l.air.Brightness(l.sun, l.moon, hc, zn), hc) + l.set.TelescopeGain
}

// horizon tells whether the horizon can be used towards a bearing: until the
// Sun has sunk to a limit that runs from one opposite it to a lower one under
// it (common practice, no published source), or by moonlight.
func (l *lookout) horizon(zn unit.Angle) bool {
	towards := (1 + (zn - l.sun.Azimuth).Cos()) / 2
	limit := l.set.HorizonAway + (l.set.HorizonUnder - l.set.HorizonAway).Mul(towards)
	return l.moonlit || l.sun.Altitude >= limit
}

// turnPerHour is how fast the sky turns: good enough, for the Moon to half a
// degree an hour, to tell what can be seen.
var turnPerHour = unit.AngleFromDeg(15.04)

// visible finds the span of a window in which each candidate can be shot, and
// leaves out those that never can. The sky is looked at every four minutes, at
// least six times and at most fifty; the ends of a span are then halved to a
// quarter of a minute. Of several spans the longest counts.
func (s *sky) visible(w *Window, set *Settings, bodies []Candidate) []Candidate {
	length := w.End.Sub(w.Begin)
	n := int(min(max(length/(4*time.Minute), 6), 50))
	instant := func(i int) time.Time { return w.Begin.Add(length * time.Duration(i) / time.Duration(n)) }
	looks := s.lookouts(set)
	var seen []Candidate
	for _, c := range bodies {
		can := func(t time.Time) bool {
			l := looks(t)
			gha := c.GHA + turnPerHour.Mul(t.Sub(w.Best).Hours())
			hc, zn := astro.AltAz(gha, c.Dec, l.fix.Lat, l.fix.Lon)
			return l.hidden(c.Body, c.Magnitude, hc, zn) == ""
		}
		first, last := longestRun(n+1, func(i int) bool { return can(instant(i)) })
		if first < 0 {
			continue
		}
		c.From, c.To = instant(first), instant(last)
		if first > 0 {
			c.From = edge(instant(first-1), c.From, can)
		}
		if last < n {
			c.To = edge(instant(last+1), c.To, can)
		}
		seen = append(seen, c)
	}
	return seen
}

// lookouts gives the lookout of any instant, made once for each.
func (s *sky) lookouts(set *Settings) func(time.Time) *lookout {
	made := map[time.Time]*lookout{}
	return func(t time.Time) *lookout {
		l := made[t]
		if l == nil {
			fresh := set.lookout(s.ephemeris.At(t), t, s.passage.At(t))
			l = &fresh
			made[t] = l
		}
		return l
	}
}

// longestRun finds the longest run of indices below n for which ok holds; first
// is -1 where there is none.
func longestRun(n int, ok func(int) bool) (first, last int) {
	first, last = -1, -2
	start := -1
	for i := range n + 1 {
		switch {
		case i < n && ok(i):
			if start < 0 {
				start = i
			}
		case start >= 0:
			if i-1-start > last-first {
				first, last = start, i-1
			}
			start = -1
		}
	}
	return first, last
}

// edge halves the way from an instant at which ok fails to one at which it
// holds, to a quarter of a minute, and gives the end at which it holds.
func edge(fails, holds time.Time, ok func(time.Time) bool) time.Time {
	for holds.Sub(fails).Abs() > 15*time.Second {
		mid := middle(fails, holds)
		if ok(mid) {
			holds = mid
		} else {
			fails = mid
		}
	}
	return holds
}
