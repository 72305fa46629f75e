package plan

import (
	"fmt"
	"io"
	"strings"
	"time"

	"gloam/track"
	"gloam/track/dm"
)

// WriteRoute prints for a person what was understood of a route: ends, legs,
// stays, the ship's clock and the date line.
func WriteRoute(w io.Writer, p *track.Passage, clock *track.Clock, notes []string, bold bool) error {
	t := &text{shipTime: clock.At, bold: bold}
	t.head(p)
	t.line("")
	t.legs(p)
	t.line("")
	t.clockDays(clock)
	for _, at := range p.DateLine() {
		t.line("Crosses 180° at %s, in %s", t.dateTimes(at), dm.Lat(p.At(at).Lat))
	}
	t.notes(notes)
	_, err := w.Write(t.Bytes())
	return err
}

// head prints the voyage's name, ends and length.
func (t *text) head(p *track.Passage) {
	name := p.Name
	if name == "" {
		name = "Voyage"
	}
	first, last := p.Legs[0].From, p.Legs[len(p.Legs)-1].To
	t.line("%s", t.strong(name))
	t.line("From      %s  %s", t.dateTimes(p.Departure), first.Label())
	t.line("To        %s  %s", t.dateTimes(p.Arrival), last.Label())
	sailed := p.UnderWay()
	lies := ""
	if rest := p.Arrival.Sub(p.Departure) - sailed; rest > 0 {
		lies = ", lying still " + spanText(rest)
	}
	t.line("Distance  %.1f NM, under way %s%s", p.DistanceNM, spanText(sailed), lies)
}

// legs prints the table of legs and stays.
func (t *text) legs(p *track.Passage) {
	t.line("Leg  Course    Miles  Knots  ETD (UTC)    ETA (UTC)    To")
	number, circles := 0, false
	for _, l := range p.Legs {
		times := minuteOf(l.ETD).Format("01-02 15:04") + "  " + minuteOf(l.ETA).Format("01-02 15:04")
		if l.Stays() {
			t.line("     stays %-17s %s  %s", spanText(l.ETA.Sub(l.ETD)), times, l.To.Label())
			continue
		}
		number++
		mark := ' '
		if l.Sailing == track.GreatCircle {
			mark, circles = '*', true
		}
		t.line("%3d  %s%c %7.1f  %5.1f  %s  %s", number, dm.Course(l.Course), mark, l.DistanceNM, l.SpeedKn, times, l.To.Label())
	}
	if circles {
		t.line("     * great circle: the course is the one at its beginning.")
	}
}

// clockDays prints what is done to the ship's clock from day to day.
func (t *text) clockDays(clock *track.Clock) {
	for i, d := range clock.Days() {
		zone, done := d.Offset, []string{}
		for _, c := range clock.Changes(d) {
			done, zone = append(done, ChangeText(c)), c.Offset()
		}
		if len(done) > 0 || i == 0 {
			t.line("%s  ship's time %-18s %s", d.Date.Format("2006-01-02"), ZoneText(zone), strings.Join(done, "; "))
		}
	}
}

func (t *text) notes(notes []string) {
	for _, n := range notes {
		t.line("Note: %s", n)
	}
}

// ChangeText says what is done to clock and date: "Clock back 1 h at midnight".
func ChangeText(c track.Change) string {
	var done []string
	if c.Clock != 0 {
		when := "at midnight"
		if !c.AtMidnight() {
			when = "at " + c.At.Add(c.From).Format("15:04")
		}
		done = append(done, fmt.Sprintf("Clock %s %s", stepText(c.Clock), when))
	}
	switch {
	case c.Dates < 0:
		done = append(done, "Date line crossed: the same date again")
	case c.Dates > 0:
		done = append(done, "Date line crossed: a date is skipped")
	}
	return strings.Join(done, ". ")
}

// stepText writes a step of the clock: "back 1 h", "forward 30 min".
func stepText(d time.Duration) string {
	way := "forward"
	if d < 0 {
		way, d = "back", -d
	}
	if d%time.Hour == 0 {
		return fmt.Sprintf("%s %d h", way, d/time.Hour)
	}
	return fmt.Sprintf("%s %d min", way, d/time.Minute)
}
