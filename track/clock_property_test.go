package track

import (
	"fmt"
	"math"
	"testing"
	"time"

	"pgregory.net/rapid"
)

// clockFault walks a passage minute by minute and tells the first thing about
// its clock that does not hold, or "".
func clockFault(p *Passage, c *Clock) string {
	days := c.Days()
	if len(days) == 0 || days[0].Begin.After(p.Departure) || days[len(days)-1].Begin.After(p.Arrival) {
		return fmt.Sprintf("days %v do not cover the passage", dayText(c))
	}
	for i := 1; i < len(days); i++ {
		if long := days[i].Begin.Sub(days[i-1].Begin); long < day/2 || long > day*3/2 || days[i].Begin.Before(p.Departure) {
			return fmt.Sprintf("day %d begins %v after the one before it", i, long)
		}
	}
	i := 0
	for t := p.Departure; !t.After(p.Arrival); t = t.Add(time.Minute) {
		for i+1 < len(days) && !t.Before(days[i+1].Begin) {
			i++
		}
		shown, d := c.At(t), c.Day(t)
		if d != days[i] {
			return fmt.Sprintf("%v: day %v, want %v", t, d.Date, days[i].Date)
		}
		if y, m, n := shown.Date(); !d.Date.Equal(time.Date(y, m, n, 0, 0, 0, 0, time.UTC)) || !shown.Equal(t) {
			return fmt.Sprintf("%v: the clock shows %v on the day %v", t, shown, d.Date)
		}
	}
	return ""
}

// noonFault finds each local mean noon of a passage by stepping a minute and
// wants that day's offset to be the zone of the place: the definition.
func noonFault(p *Passage, c *Clock) string {
	meanTime := func(t time.Time) float64 { // hours, [0, 24)
		h := float64(t.Unix()%86400)/3600 + p.At(t).Lon.Deg()/15
		return h - 24*math.Floor(h/24)
	}
	for t := p.Departure; t.Before(p.Arrival); t = t.Add(time.Minute) {
		if a, b := meanTime(t), meanTime(t.Add(time.Minute)); a > 12 || b < 12 || b-a > 1 {
			continue
		}
		lon := p.At(t).Lon
		edge := math.Abs(math.Mod(math.Abs(lon.Deg()), 15) - 7.5)
		// A minute's run at 16 kn in 46° of latitude is 0.006° of longitude.
		if got := c.Day(t).Offset; got != ZoneOffset(lon) && edge > 0.01 && math.Abs(lon.Deg()) < 179.99 {
			return fmt.Sprintf("noon at %v in %.3f°: offset %v, want %v", t, lon.Deg(), got, ZoneOffset(lon))
		}
	}
	return ""
}

// drawVoyage draws an invented voyage of up to some 1,500 NM.
func drawVoyage(t *rapid.T, lat, slowest, fastest float64) *Passage {
	var vertices []Waypoint
	place := drawPlace(t, lat)
	switch rapid.IntRange(0, 3).Draw(t, "start") {
	case 0: // close to the date line
		place = PositionFromDeg(place.Lat.Deg(), 180+rapid.Float64Range(-15, 15).Draw(t, "from 180"))
	case 1: // close to the highest latitude
		place = PositionFromDeg(lat-rapid.Float64Range(0, 2).Draw(t, "from the edge"), place.Lon.Deg())
	}
	for range rapid.IntRange(2, 4).Draw(t, "waypoints") {
		vertices = append(vertices, Waypoint{Position: place})
		run := rapid.Float64Range(0.1, 500).Draw(t, "run") / 60
		course := rapid.Float64Range(0, 360).Draw(t, "course") / 180 * math.Pi
		north := math.Max(-lat, math.Min(lat, place.Lat.Deg()+run*math.Cos(course)))
		place = PositionFromDeg(north, place.Lon.Deg()+run*math.Sin(course)/place.Lat.Cos())
	}
	r, err := newRoute(vertices, len(vertices))
	if err != nil {
		t.Skip(err)
	}
	departure := noon.Add(time.Duration(rapid.IntRange(0, 3000).Draw(t, "minutes")) * time.Minute)
	how := rapid.SampledFrom([]Sailing{Rhumb, GreatCircle}).Draw(t, "sailing")
	p, err := r.Sail(Orders{Departure: departure, SpeedKn: rapid.Float64Range(slowest, fastest).Draw(t, "speed"), Sailing: &how})
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// The clock's date is the day's at every minute, and the days tile the
// passage, for any voyage at all, even round a pole at 100 kn.
func TestClockShowsTheDate(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawVoyage(t, 89.9, 8, MaxSpeedKn)
		if fault := clockFault(p, NewClock(p, nil)); fault != "" {
			t.Error(fault)
		}
	})
}

// A ship that makes less than 15° of longitude a day, here at most 16 kn in
// 46° of latitude, keeps the zone of noon and shifts its clock by one hour or
// none, at midnight: back to 23:00, or forward to 01:00.
func TestClockKeepsNoon(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawVoyage(t, 45, 8, 16)
		c := NewClock(p, nil)
		if fault := noonFault(p, c); fault != "" {
			t.Error(fault)
		}
		days := c.Days()
		for i := 1; i < len(days); i++ {
			begin := c.At(days[i].Begin).Format("15:04:05")
			long := days[i].Begin.Sub(days[i-1].Begin)
			if (begin != "00:00:00" && begin != "01:00:00") || long < 23*time.Hour || long > 25*time.Hour {
				t.Errorf("day of %v, %v h long, next begins at %s", days[i-1].Date, long.Hours(), begin)
			}
			if before := c.At(days[i].Begin.Add(-time.Second)).Format("15:04:05"); before != "23:59:59" {
				t.Errorf("the second before the day of %v is %s", days[i].Date, before)
			}
		}
	})
}
