package track

import (
	"fmt"
	"testing"
	"time"

	"github.com/soniakeys/unit"
)

// Zone description, here with its sign turned: plus is ahead of UTC. Sources:
// boundaries by the rule of NAVEDTRA 14220, "Standard Time Zones"; places with
// their zones from published problems: sight problems of 1981, Naval Science 3,
// Pub. No. 9 (the last from memory). Exactly on a boundary, common practice has
// no rule: here the zone farther from Greenwich.
func TestZoneOffset(t *testing.T) {
	for _, c := range []struct {
		deg, min float64
		want     int
	}{
		{7, 29, 0}, {7, 31, 1}, {172, 29, 11}, {172, 31, 12}, {-172, -31, -12}, {-7, -29, 0}, {-7, -31, -1}, {-172, -29, -11},
		{140, 35, 9}, {164, 26, 11}, {154, 47, 10}, {122, 45, 8}, {124, 0, 8}, {67, 18, 4},
		{-159, -24, -11}, {-157, -10, -10}, {-71, 0, -5},
		{0, 0, 0}, {180, 0, 12}, {-179, -59.9, -12}, {179, 59.9, 12},
	} {
		if got := ZoneOffset(unit.AngleFromDeg(c.deg + c.min/60)); got != time.Duration(c.want)*time.Hour {
			t.Errorf("%v° %v': %v, want %d h", c.deg, c.min, got, c.want)
		}
	}
	for zone := 1; zone <= 12; zone++ {
		edge := PositionFromDeg(0, float64(zone)*15-7.5).Lon
		for sign := unit.Angle(-1); sign <= 1; sign += 2 {
			if got := ZoneOffset(sign * edge); got != time.Duration(sign)*time.Duration(zone)*time.Hour {
				t.Errorf("boundary %v°: %v, want %v h", (sign * edge).Deg(), got, float64(sign)*float64(zone))
			}
		}
	}
}

// dayText writes the days as "date offset length", the last without its length.
func dayText(c *Clock) []string {
	var all []string
	days := c.Days()
	for i, d := range days {
		s := fmt.Sprintf("%s %+d", d.Date.Format("01-02"), int(d.Offset.Hours()))
		if i+1 < len(days) {
			s += fmt.Sprintf(" %v", days[i+1].Begin.Sub(d.Begin).Hours())
		}
		all = append(all, s)
	}
	return all
}

func at(day, hour, min int) time.Time { return time.Date(2026, 11, day, hour, min, 0, 0, time.UTC) }

// Days of invented passages on the equator, where a degree is 60.1 NM: at
// 12.5 kn the ship makes 5° a day, at 25 kn 10°. Source: common practice, no
// published source: clocks are shifted at midnight, back bound west, forward
// bound east, and the date line changes the date.
var clockCases = []struct {
	name      string
	departure time.Time
	speed     float64
	lon       []float64
	want      []string
}{
	{"in one zone", at(20, 9, 0), 5, []float64{3, -2}, []string{"11-20 +0 24", "11-21 +0 24", "11-22 +0"}},
	// Noon in 13°, 18°, 23° and 28°: the second night the clock is shifted. Put
	// back, it lengthens the day that ends; put forward, it shortens the next.
	{"west", at(20, 13, 0), 12.5, []float64{-13, -28}, []string{"11-20 -1 24", "11-21 -1 25", "11-22 -2 24", "11-23 -2"}},
	{"east", at(20, 11, 0), 12.5, []float64{13, 28}, []string{"11-20 +1 24", "11-21 +1 24", "11-22 +2 23", "11-23 +2"}},
	// 00:10 by the zone left, but the clock is that of the noon to come: 23:10,
	// still the day before.
	{"west just after midnight", at(21, 0, 10), 12.5, []float64{-7.4, -12}, []string{"11-20 -1 24", "11-21 -1"}},
	{"east just after midnight", at(21, 0, 10), 12.5, []float64{7.4, 12}, []string{"11-21 +1"}},
	{"east just before midnight", at(20, 23, 50), 12.5, []float64{7.4, 12}, []string{"11-20 +0 24", "11-21 +1"}},
	// Date line: 11-22 is skipped bound west, 11-21 is lived twice bound east.
	{"west over the date line", at(21, 0, 0), 12.5, []float64{-174, 173}, []string{"11-20 -12 24", "11-21 -12 24", "11-23 +12 24", "11-24 +12"}},
	{"east over the date line", at(20, 0, 0), 12.5, []float64{174, -173}, []string{"11-20 +12 24", "11-21 +12 24", "11-21 -12 24", "11-22 -12"}},
	// Zone and date change in one night, from 171 W (-11) to 179 E (+12).
	{"west over zone and date line", at(20, 23, 24), 25, []float64{-171, 160}, []string{"11-20 -11 25", "11-22 +12 25", "11-23 +11 24", "11-24 +11"}},
	{"east over zone and date line", at(20, 0, 36), 25, []float64{171, -160}, []string{"11-20 +11 24", "11-20 -12 23", "11-21 -11 23", "11-22 -11"}},
}

func TestClockDays(t *testing.T) {
	for _, c := range clockCases {
		t.Run(c.name, func(t *testing.T) {
			p := sail(t, c.departure, c.speed, Rhumb, 0, c.lon[0], 0, c.lon[1])
			clock := NewClock(p, nil)
			if got := dayText(clock); fmt.Sprint(got) != fmt.Sprint(c.want) {
				t.Errorf("days %q\nwant %q", got, c.want)
			}
			if fault := clockFault(p, clock); fault != "" {
				t.Error(fault)
			}
		})
	}
}

// The hands of the clock round a shift. Source: as for clockCases.
func TestClockAtMidnight(t *testing.T) {
	west := NewClock(sail(t, at(20, 13, 0), 12.5, Rhumb, 0, -13, 0, -28), nil)
	east := NewClock(sail(t, at(20, 11, 0), 12.5, Rhumb, 0, 13, 0, 28), nil)
	line := NewClock(sail(t, at(20, 23, 24), 25, Rhumb, 0, -171, 0, 160), nil)
	port := NewClock(sail(t, at(21, 0, 10), 12.5, Rhumb, 0, -7.4, 0, -12), nil)
	for _, c := range []struct {
		clock *Clock
		utc   time.Time
		want  string
	}{
		{west, at(22, 0, 59), "11-21 23:59 -0100"},
		{west, at(22, 1, 0), "11-21 23:00 -0200"},
		{west, at(22, 1, 59), "11-21 23:59 -0200"},
		{west, at(22, 2, 0), "11-22 00:00 -0200"},
		{east, at(21, 22, 59), "11-21 23:59 +0100"},
		{east, at(21, 23, 0), "11-22 01:00 +0200"},
		{line, at(21, 10, 59), "11-20 23:59 -1100"},
		{line, at(21, 11, 0), "11-20 23:00 -1200"},
		{line, at(21, 11, 59), "11-20 23:59 -1200"},
		{line, at(21, 12, 0), "11-22 00:00 +1200"},
		{port, at(21, 0, 10), "11-20 23:10 -0100"},
		{port, at(21, 1, 0), "11-21 00:00 -0100"},
		{port, at(20, 0, 10), "11-19 23:10 -0100"}, // before departure
		{port, at(25, 0, 10), "11-24 23:10 -0100"}, // after arrival
	} {
		got := c.clock.At(c.utc)
		if got.Format("01-02 15:04 -0700") != c.want || !got.Equal(c.utc) {
			t.Errorf("%s: %s, want %s", c.utc.Format("01-02 15:04"), got.Format("01-02 15:04 -0700"), c.want)
		}
	}
}

// The ship arrives in the hour that is lived twice: the old date still holds
// and the day to come is none of the passage's.
func TestArrivalInTheRepeatedHour(t *testing.T) {
	// From zone -1 to an anchorage in 22.6° W, zone -2: the clock goes back at
	// 01:00 UTC on the 22nd, the new date begins at 02:00.
	for _, minutes := range []int{1, 30, 59} {
		arrival := at(22, 1, minutes)
		hours := arrival.Sub(at(20, 13, 0)).Hours()
		p := sail(t, at(20, 13, 0), 12.5, Rhumb, 0, -22.6+hours*12.5/60.1077, 0, -22.6)
		c := NewClock(p, nil)
		if got := c.At(p.Arrival); got.Day() != 21 || got.Hour() != 23 {
			t.Errorf("arrival %s, want 23 h on the 21st", got.Format("01-02 15:04 -0700"))
		}
		days := c.Days()
		if last := days[len(days)-1]; last.Date.Day() != 21 || c.Day(p.Arrival) != last {
			t.Errorf("last day %v, day of arrival %v, want the 21st", last.Date, c.Day(p.Arrival).Date)
		}
		if fault := clockFault(p, c); fault != "" {
			t.Error(fault)
		}
	}
}
