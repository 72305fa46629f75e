package track

import (
	"math"
	"sort"
	"time"

	"github.com/soniakeys/unit"
)

// Clock is the clock a ship keeps on a passage by nautical zones: on each
// ship's day the offset of the 15° band in which the ship lies at local mean
// noon. The clock is shifted at midnight.
type Clock struct {
	days    []Day
	arrival time.Time
}

// Day is one ship's day. Across the date line a date is lived twice or
// skipped; days that share a date differ in Begin.
type Day struct {
	Date   time.Time     // the ship's date, 00:00 UTC of that date
	Offset time.Duration // ship's time less UTC
	Begin  time.Time     // UTC instant at which the day begins

	// A clock put back at midnight shows the old date again until Begin.
	shift time.Time     // UTC instant at which the clock is put to this day's time
	early time.Duration // ship's time less UTC from shift to Begin
}

// ZoneOffset is ship's time less UTC in the 15° band of a longitude: whole
// hours, -12 to 12. A longitude on the boundary, to 1e-9°, belongs to the band
// farther from Greenwich; the 12th band is split by the sign of the longitude.
func ZoneOffset(lon unit.Angle) time.Duration {
	return time.Duration(math.Round(math.Round(lon.Deg()*1e9)/15e9)) * time.Hour
}

const day = 24 * time.Hour

// NewClock works out the ship's days of a passage, beginning with the day
// before departure, which falls away unless the first shift is still to come.
func NewClock(p *Passage) *Clock {
	zone := ZoneOffset(p.At(p.Departure).Lon)
	d := Day{Date: p.Departure.Add(zone).Truncate(day).Add(-day), Offset: zone}
	c := &Clock{arrival: p.Arrival}
	for !d.shift.After(p.Arrival) {
		if !d.Begin.After(p.Departure) {
			c.days = c.days[:0]
		}
		c.days = append(c.days, d)
		d = d.next(p)
	}
	first := &c.days[0] // no clock was shifted the night before
	first.Begin = first.Date.Add(-first.Offset)
	first.shift, first.early = first.Begin, first.Offset
	return c
}

// next is the ship's day after d. At midnight the clock goes forward into the
// new day, or back and lives the last hours of the old date once more; the
// date line changes only the date.
func (d Day) next(p *Passage) Day {
	midnight := d.Date.Add(day - d.Offset)
	noon := p.localNoon(midnight.Add(day / 2))
	n := Day{Offset: ZoneOffset(p.At(noon).Lon), Begin: midnight, shift: midnight}
	ahead := n.Offset - d.Offset
	if ahead > day/2 {
		ahead -= day
	} else if ahead < -day/2 {
		ahead += day
	}
	n.early = d.Offset + ahead
	if ahead < 0 {
		n.Begin = midnight.Add(-ahead)
	}
	n.Date = n.Begin.Add(n.Offset).Truncate(day)
	return n
}

// localNoon is the instant within six hours of guess at which local mean time
// on board is 12:00. Noons step by a day and shift with the ship's longitude;
// the bound of six hours holds close to a pole, where longitude runs wild.
func (p *Passage) localNoon(guess time.Time) time.Time {
	noon := guess
	for range 5 {
		lmt := noon.Add(hoursToDuration(p.At(noon).Lon.Deg() / 15))
		noon = noon.Add(day/2 - lmt.Sub(lmt.Truncate(day)))
	}
	return earlier(later(noon, guess.Add(-day/4)), guess.Add(day/4))
}

// Day gives the ship's day of an instant; before the first day the first,
// after the last the last.
func (c *Clock) Day(t time.Time) Day {
	return c.days[c.index(t, func(d Day) time.Time { return d.Begin })]
}

// Days gives all ship's days of the passage in order: each lasts until the
// next begins.
func (c *Clock) Days() []Day {
	return c.days[:c.index(c.arrival, func(d Day) time.Time { return d.Begin })+1]
}

// At gives an instant as the ship's clock shows it; its date is that of
// [Clock.Day]. Where the clock is put back at the date line, bound west, the
// last hour of the old date has the new day's time on the old date: the offset
// is then as low as -13 h for a ship that crosses two zones at once.
func (c *Clock) At(t time.Time) time.Time {
	d := c.days[c.index(t, func(d Day) time.Time { return d.shift })]
	offset := d.Offset
	if t.Before(d.Begin) && !t.Before(d.shift) {
		offset = d.early
	}
	return t.In(time.FixedZone("", int(offset.Seconds())))
}

// index finds the last day whose mark is not after t.
func (c *Clock) index(t time.Time, mark func(Day) time.Time) int {
	i := sort.Search(len(c.days), func(i int) bool { return mark(c.days[i]).After(t) })
	return max(i-1, 0)
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
