package track

import (
	"sort"
	"time"
)

// Clock is the clock a ship keeps on a passage.
type Clock struct {
	shifts  []Shift // in order; the first counts before its instant too
	days    []Day
	changes []Change
	arrival time.Time
}

// Shift is an instant from which the ship's clock shows UTC plus an offset.
type Shift struct {
	At     time.Time
	Offset time.Duration // ship's time less UTC
}

// Day is one ship's day. Across the date line a date is lived twice or
// skipped; days that share a date differ in Begin.
type Day struct {
	Date   time.Time     // the ship's date, 00:00 UTC of that date
	Offset time.Duration // ship's time less UTC as the day begins
	Begin  time.Time     // UTC instant at which the day begins
}

// Change is what is done to clock and date at an instant. Done at midnight it
// belongs to the day that begins, else to the day in which it falls.
type Change struct {
	At    time.Time     // UTC
	From  time.Duration // ship's time less UTC until then
	Clock time.Duration // forward, or back where below zero
	Dates int           // date line: 1 for a date skipped, -1 for one lived again
}

const day = 24 * time.Hour

// dateLineShift is how far the hands may be shifted on the night of the date
// line.
const dateLineShift = 3 * time.Hour

// NewClock works out the ship's days of a passage by a rule; nil stands for
// [NauticalTime].
func NewClock(p *Passage, rule ShipTime) *Clock {
	if rule == nil {
		rule = NauticalTime
	}
	c := &Clock{shifts: rule(p), arrival: p.Arrival}
	first := Day{Offset: c.offset(p.Departure)}
	first.Date = dateOf(p.Departure, first.Offset)
	first.Begin = first.Date.Add(-first.Offset)
	c.days = []Day{first}
	for i := range c.shifts {
		c.addShift(i, p.Departure)
	}
	return c
}

// addShift adds the change that a shift brings and the days that begin before
// the next.
func (c *Clock) addShift(i int, departure time.Time) {
	s, end := c.shifts[i], c.arrival
	if i+1 < len(c.shifts) {
		end = earlier(end, c.shifts[i+1].At.Add(-1))
	}
	if s.At.After(departure) {
		c.change(s, c.shifts[i-1].Offset)
	}
	from := later(s.At, departure)
	for m := dateOf(from, s.Offset).Add(day - s.Offset); !m.After(end); m = m.Add(day) {
		if date := dateOf(m, s.Offset); date.After(c.last().Date) {
			c.days = append(c.days, Day{date, s.Offset, m})
		}
	}
}

// change notes a shift from an offset before it, and the day that begins with
// it: where the date steps on, or is lived again beyond the date line.
func (c *Clock) change(s Shift, before time.Duration) {
	step, dates := s.Offset-before, 0
	for sign := time.Duration(-1); sign <= 1; sign += 2 { // a day, give or take a shift of the hands, is the date line's
		if rest := step - sign*day; rest.Abs() <= dateLineShift {
			step, dates = rest, int(sign)
		}
	}
	if s.At.After(c.arrival) {
		return
	}
	c.changes = append(c.changes, Change{s.At, before, step, dates})
	if date := dateOf(s.At, s.Offset); dates < 0 || date.After(c.last().Date) {
		c.days = append(c.days, Day{date, s.Offset, s.At})
	}
}

func (c *Clock) last() Day { return c.days[len(c.days)-1] }

// dateOf is the date that a clock of some offset shows, as 00:00 UTC.
func dateOf(t time.Time, offset time.Duration) time.Time {
	return t.UTC().Add(offset).Truncate(day)
}

// Day gives the ship's day of an instant; before the first day the first,
// after the last the last.
func (c *Clock) Day(t time.Time) Day {
	i := sort.Search(len(c.days), func(i int) bool { return c.days[i].Begin.After(t) })
	return c.days[max(i-1, 0)]
}

// Days gives all ship's days of the passage in order: each lasts until the
// next begins.
func (c *Clock) Days() []Day { return c.days }

// Changes gives what is done to the clock for a day.
func (c *Clock) Changes(d Day) (all []Change) {
	for _, x := range c.changes {
		at := x.At
		if x.AtMidnight() { // the day may begin an hour later, the clock put back
			i := sort.Search(len(c.days), func(i int) bool { return !c.days[i].Begin.Before(at) })
			if i == len(c.days) {
				continue
			}
			at = c.days[i].Begin
		}
		if c.Day(at) == d {
			all = append(all, x)
		}
	}
	return all
}

// Offset is ship's time less UTC after the change.
func (x Change) Offset() time.Duration { return x.From + x.Clock + day*time.Duration(x.Dates) }

// AtMidnight tells whether the clock showed midnight before the change.
func (x Change) AtMidnight() bool { return x.At.Add(x.From).Truncate(day).Equal(x.At.Add(x.From)) }

// At gives an instant as the ship's clock shows it; its date is that of
// [Clock.Day]. Where the clock is put back at the date line, bound west, the
// last hour of the old date has the new day's time on the old date: the offset
// is then -13 h.
func (c *Clock) At(t time.Time) time.Time {
	return t.In(time.FixedZone("", int(c.offset(t).Seconds())))
}

func (c *Clock) offset(t time.Time) time.Duration {
	i := sort.Search(len(c.shifts), func(i int) bool { return c.shifts[i].At.After(t) })
	return c.shifts[max(i-1, 0)].Offset
}

func later(a, b time.Time) time.Time {
	if a.After(b) {
		return a
	}
	return b
}

func earlier(a, b time.Time) time.Time {
	if a.Before(b) {
		return a
	}
	return b
}
