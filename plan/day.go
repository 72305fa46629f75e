package plan

import (
	"fmt"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
	"gloam/track/dm"
)

// Day is one ship's day of the passage, or as much of it as the passage has.
type Day struct {
	track.Day
	Changes  []track.Change // what is done to clock and date
	From, To time.Time      // UTC: the part of the day that the passage has
	Events   []Event
	Windows  []Window // those that begin on the day
	Moon     MoonPhase
	NoWindow string   // why the day has no window; empty where it has one
	Remains  []Remain // what there is to shoot on a day without a window

	Programme []Item      // all that is worth doing, in order of time
	Light     []LightSpan // the day from end to end
	MoonUp    []Span      // when the Moon is above the horizon
}

// MoonPhase is how the Moon looks.
type MoonPhase struct {
	Illuminated float64 // lit part of the disc, 0 to 1
	Waxing      bool
	Highest     time.Time  // UTC: when it stands highest on the day, to an hour
	Tilt        unit.Angle // its lit side then, clockwise from straight up
}

// Remain is a body that can be shot on a day without star window: when it
// stands highest, and how high.
type Remain struct {
	Body     astro.Body
	Highest  time.Time
	Altitude unit.Angle
}

// days sorts events and windows into ship's days and says of a day without a
// window why it has none.
func (s *sky) days(clock *track.Clock, set Settings, events []Event, windows []Window) []Day {
	var all []Day
	list, every := clock.Days(), windows
	if n := len(list); n > 1 && !list[n-1].Begin.Before(s.passage.Arrival) {
		list = list[:n-1] // arrival at midnight begins no day
	}
	for i, d := range list {
		day := Day{Day: d, Changes: clock.Changes(d), From: laterOf(d.Begin, s.passage.Departure), To: s.passage.Arrival}
		last := i+1 == len(list)
		if !last {
			day.To = list[i+1].Begin
		}
		for len(events) > 0 && (last || events[0].Time.Before(day.To)) {
			day.Events, events = append(day.Events, events[0]), events[1:]
		}
		for len(windows) > 0 && (last || windows[0].Begin.Before(day.To)) {
			day.Windows, windows = append(day.Windows, windows[0]), windows[1:]
		}
		if len(day.Windows) == 0 {
			day.NoWindow = s.noWindow(day, set, clock, every)
			day.Remains = s.remains(day, set)
		}
		all = append(all, day)
	}
	s.programmes(all, set, clock)
	return all
}

// noWindow says in words why a day has no window: a window of another date
// reaches into it, or the Sun keeps out of the band. For the Sun it looks at
// the whole day, the ship lying still before departure and after arrival.
func (s *sky) noWindow(d Day, set Settings, clock *track.Clock, every []Window) string {
	for _, w := range every {
		if w.Begin.Before(d.To) && w.End.After(d.From) {
			return fmt.Sprintf("the %s of %s last into this date", w.Kind.Words(), clock.Day(w.Begin).Date.Format("2 January"))
		}
	}
	end := d.Begin.Add(24 * time.Hour)
	if d.To.Before(s.passage.Arrival) {
		end = d.To
	}
	lowest, _ := highest(d.Begin, end, func(t time.Time) float64 { return -s.altitude(astro.Sun, t).Rad() })
	greatest, _ := highest(d.Begin, end, func(t time.Time) float64 { return s.altitude(astro.Sun, t).Rad() })
	low, high := unit.Angle(-lowest), unit.Angle(greatest)
	switch {
	case low > set.UpperSun:
		return fmt.Sprintf("the Sun does not sink to %s (lowest %s)", wholeDegrees(set.UpperSun), dm.Altitude(low))
	case high < set.LowerSun:
		return fmt.Sprintf("the Sun does not rise to %s (highest %s)", wholeDegrees(set.LowerSun), dm.Altitude(high))
	}
	return "the day's twilights fall outside the passage"
}

func wholeDegrees(a unit.Angle) string { return fmt.Sprintf("%.4g°", a.Deg()) }

// remains lists Sun, Moon and Venus where they come between the altitude
// limits, with the instant they stand highest below the upper one.
func (s *sky) remains(d Day, set Settings) []Remain {
	var all []Remain
	for _, b := range []astro.Body{astro.Sun, astro.Moon, astro.Venus} {
		value, at := highest(d.From, d.To, func(t time.Time) float64 {
			h := s.altitude(b, t)
			return min(h, 2*set.HighestAltitude-h).Rad() // above the limit the lower the better
		})
		if unit.Angle(value) < set.LowestAltitude {
			continue
		}
		if b == astro.Venus && astro.Elongation(s.ephemeris.At(at), b) < venusElongation {
			continue
		}
		all = append(all, Remain{b, at, unit.Angle(value)})
	}
	return all
}

// highest finds the greatest value of f in a span and when it is reached, to a
// minute: the best of samples ten minutes apart, then narrowed by thirds.
func highest(from, to time.Time, f func(time.Time) float64) (value float64, at time.Time) {
	const step = 10 * time.Minute
	at, value = to, f(to)
	for t := from; t.Before(to); t = t.Add(step) {
		if v := f(t); v > value {
			at, value = t, v
		}
	}
	a, b := laterOf(at.Add(-step), from), earlierOf(at.Add(step), to)
	for b.Sub(a) > time.Minute {
		third := b.Sub(a) / 3
		if f(a.Add(third)) < f(b.Add(-third)) {
			a = a.Add(third)
		} else {
			b = b.Add(-third)
		}
	}
	at = middle(a, b)
	return f(at), at
}

func laterOf(a, b time.Time) time.Time {
	if a.After(b) {
		return a
	}
	return b
}

func earlierOf(a, b time.Time) time.Time {
	if a.Before(b) {
		return a
	}
	return b
}
