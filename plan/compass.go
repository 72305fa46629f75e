package plan

import (
	"fmt"
	"math"
	"strings"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
	"gloam/track/dm"
	"gloam/track/magnetic"
)

// Check is a bearing by which the compass is checked.
type Check struct {
	Body      astro.Body
	Time      time.Time // UTC
	Fix       track.Fix
	Altitude  unit.Angle // Hc
	True      unit.Angle // Zn
	Variation unit.Angle // east positive
	Magnetic  unit.Angle // bearing on a magnetic compass without deviation
	Relative  unit.Angle // from the bow
	Doubtful  string     // why the variation is not to be trusted; empty where it is
}

// check is the bearing of a body at an instant.
func (s *sky) check(b astro.Body, t time.Time) Check {
	c := Check{Body: b, Time: t, Fix: s.passage.At(t)}
	_, c.Altitude, c.True = s.place(b, t)
	field := magnetic.At(c.Fix.Lat, c.Fix.Lon, t)
	c.Variation = field.Variation()
	c.Magnetic, c.Relative = (c.True - c.Variation).Mod1(), (c.True - c.Fix.Course).Mod1()
	switch {
	case !magnetic.Holds(t):
		c.Doubtful = "the magnetic model holds from 2025 to 2030 only"
	case field.Horizontal() < magnetic.Weak:
		c.Doubtful = fmt.Sprintf("the horizontal field is weak, %.0f nT", field.Horizontal())
	}
	return c
}

// Words gives the bearings: "true 112.4°, variation 14.2° W, compass 126.6°
// before deviation".
func (c *Check) Words() string {
	side := 'E'
	if c.Variation < 0 {
		side = 'W'
	}
	return fmt.Sprintf("true %s, variation %.1f° %c, compass %s before deviation",
		dm.Course(c.True), math.Abs(c.Variation.Deg()), side, dm.Course(c.Magnetic))
}

// compassItem is a check of one body.
func (s *sky) compassItem(title string, b astro.Body, t time.Time, ready time.Duration) Item {
	c := s.check(b, t)
	item := Item{Kind: Compass, Title: title, Begin: t.Add(-ready), Best: t, End: t.Add(ready), Fix: c.Fix, Checks: []Check{c}, Words: []string{c.Words()}}
	if c.Doubtful != "" {
		item.Words = append(item.Words, "Variation not to be trusted: "+c.Doubtful)
	}
	return item
}

// compass are the day's checks of the compass, by the Sun and in star windows.
func (s *sky) compass(d *Day, t *sunTable, clock *track.Clock) []Item {
	items := append(s.amplitudes(d), t.lowSun(clock)...)
	for i := range d.Windows {
		items = append(items, s.lowStar(&d.Windows[i])...)
	}
	return items
}

// amplitudes are a day's checks by the Sun on the celestial horizon.
func (s *sky) amplitudes(d *Day) []Item {
	var items []Item
	for _, x := range s.sunCrossings(0) {
		if x.time.Before(d.From) || !x.time.Before(d.To) {
			continue
		}
		title := "Amplitude, Sun setting"
		if x.rising {
			title = "Amplitude, Sun rising"
		}
		item := s.compassItem(title, astro.Sun, x.time, 2*time.Minute)
		item.Words = append(item.Words, amplitude(item.Checks[0].True)+"; the lower limb stands about two thirds of a diameter above the sea")
		items = append(items, item)
	}
	return items
}

// amplitude is a bearing counted from east or west: "amplitude E 12.3° N".
func amplitude(zn unit.Angle) string {
	from, side, a := 'E', 'N', 90-zn.Deg()
	if zn.Deg() > 180 {
		from, a = 'W', zn.Deg()-270
	}
	if a < 0 {
		side = 'S'
	}
	return fmt.Sprintf("Amplitude %c %.1f° %c", from, math.Abs(a), side)
}

// The Sun's altitudes between which its azimuth checks a compass well.
var (
	lowSunFrom = unit.AngleFromDeg(3)
	lowSunTo   = unit.AngleFromDeg(20)
)

// lowSun is a check in each watch of four hours of ship's time in which the Sun
// stands low: in the middle of the first such span.
func (t *sunTable) lowSun(clock *track.Clock) []Item {
	low := func(i int) float64 {
		if h := t.at(i).altitude; h < lowSunFrom || h > lowSunTo {
			return math.Inf(1)
		}
		return 0
	}
	var items []Item
	for from := 0; from < len(t.rows); {
		to := int(math.Ceil(endOfWatch(t.time(from), clock).Sub(t.from).Minutes()))
		if all := spans(from, min(to, len(t.rows))-1, low); len(all) > 0 {
			begin, end := t.time(all[0].begin), t.time(all[0].end)
			item := t.sky.compassItem("Azimuth of the low Sun", astro.Sun, middle(begin, end), 0)
			item.Begin, item.End = begin, end
			items = append(items, item)
		}
		from = to
	}
	return items
}

// endOfWatch is when the watch of an instant ends: at 4, 8, 12 ... by the ship's
// clock.
func endOfWatch(t time.Time, clock *track.Clock) time.Time {
	_, seconds := clock.At(t).Zone()
	offset := time.Duration(seconds) * time.Second
	const watch = 4 * time.Hour
	return t.Add(offset).Truncate(watch).Add(watch - offset)
}

// lowStar is a check in a star window: Polaris in northern waters, and the
// lowest body otherwise.
func (s *sky) lowStar(w *Window) []Item {
	var low *Candidate
	for i := range w.Bodies {
		c := &w.Bodies[i]
		if c.Body == astro.Moon {
			continue
		}
		if c.Body.String() == "Polaris" {
			low = c
			break
		}
		if low == nil || c.Altitude < low.Altitude {
			low = c
		}
	}
	if low == nil || low.Altitude > unit.AngleFromDeg(65) {
		return nil
	}
	at := earlierOf(laterOf(w.Best, low.From), low.To)
	item := s.compassItem("Azimuth of "+low.Body.String(), low.Body, at, 0)
	item.Begin, item.End = low.From, low.To
	if low.Altitude > unit.AngleFromDeg(30) && !strings.HasPrefix(low.Body.String(), "Polaris") {
		item.Words = append(item.Words, fmt.Sprintf("It stands %s high: tilt of the azimuth circle tells", dm.Altitude(low.Altitude)))
	}
	return []Item{item}
}
