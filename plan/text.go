package plan

import (
	"bytes"
	"fmt"
	"io"
	"slices"
	"strings"
	"time"
	"unicode/utf8"

	"gloam/track/dm"
)

// textWidth is how wide a line of text grows at most, but for long names.
const textWidth = 80

// WriteText prints the plan for a person: the voyage, then for each ship's
// date the events, the Moon, the programme and the windows, as far as their
// kinds are asked for. Times are given by the ship's clock and in UTC, to the
// minute. With bold, headings are set off by terminal codes.
func (p *Plan) WriteText(w io.Writer, kinds []ItemKind, bold bool) error {
	t := &text{shipTime: p.Clock.At, bold: bold}
	t.voyage(p)
	for i := range p.Days {
		t.day(&p.Days[i], kinds)
	}
	t.cautions()
	_, err := w.Write(t.Bytes())
	return err
}

// text is the print so far.
type text struct {
	bytes.Buffer
	shipTime func(time.Time) time.Time // an instant by the ship's clock
	bold     bool
}

func (t *text) cautions() {
	t.heading("CAUTIONS", "")
	for _, c := range Cautions {
		t.line("%s", c)
	}
}

func (t *text) line(format string, args ...any) {
	t.WriteString(strings.TrimRight(fmt.Sprintf(format, args...), " ") + "\n")
}

// heading prints a ruled line, a title on the left and a word on the right.
func (t *text) heading(title, right string) {
	rule := textWidth - utf8.RuneCountInString(title) - utf8.RuneCountInString(right) - 2
	t.line("")
	ruled := fmt.Sprintf("%s %s %s", title, strings.Repeat("-", max(rule, 3)), right)
	t.line("%s", t.strong(strings.TrimSpace(ruled)))
}

func (t *text) strong(s string) string {
	if t.bold {
		return "\x1b[1m" + s + "\x1b[0m"
	}
	return s
}

// legsListed is how many legs a plan lists at most.
const legsListed = 40

func (t *text) voyage(pl *Plan) {
	t.head(pl.Passage)
	t.sextant(&pl.Settings)
	t.line("Sky       bodies from %s to %s high, Sun from %s to %s", wholeDegrees(pl.Settings.LowestAltitude),
		wholeDegrees(pl.Settings.HighestAltitude), wholeDegrees(pl.Settings.UpperSun), wholeDegrees(pl.Settings.LowerSun))
	t.line("")
	if n := len(pl.Passage.Legs); n > legsListed {
		t.line("%d legs; gloam route lists them.", n)
	} else {
		t.legs(pl.Passage)
	}
	t.notes(pl.Notes)
}

func (t *text) sextant(set *Settings) {
	t.line("Sextant   eye %.1f m (dip %.1f'), index error %.1f', air %.0f °C %.0f hPa",
		set.EyeM, set.Dip().Min(), set.IndexError.Min(), set.TemperatureC, set.PressureHPa)
}

// dateTimes gives an instant in UTC and by the ship's clock.
func (t *text) dateTimes(at time.Time) string {
	at = t.minute(at)
	return fmt.Sprintf("%s UTC, %s ship", at.UTC().Format("2006-01-02 15:04"), t.shipTime(at).Format("01-02 15:04"))
}

func minuteOf(t time.Time) time.Time { return t.Round(time.Minute).UTC() }

// spanText writes a duration in days and hours: "14 d 22 h"; one of less than a
// day in hours and minutes: "6 h 30 min".
func spanText(d time.Duration) string {
	if hours := int(d.Round(time.Hour).Hours()); hours >= 24 {
		return fmt.Sprintf("%d d %d h", hours/24, hours%24)
	}
	minutes := int(d.Round(time.Minute).Minutes())
	switch {
	case minutes < 60:
		return fmt.Sprintf("%d min", minutes)
	case minutes%60 == 0:
		return fmt.Sprintf("%d h", minutes/60)
	}
	return fmt.Sprintf("%d h %d min", minutes/60, minutes%60)
}

func (t *text) day(d *Day, kinds []ItemKind) {
	t.heading(strings.ToUpper(d.Date.Format("Monday 2 January 2006")), "ship's time "+ZoneText(d.Offset))
	for _, c := range d.Changes {
		t.line("%s.", ChangeText(c))
	}
	t.line("Moon %s.", d.Moon.Words())
	if d.NoWindow != "" && slices.Contains(kinds, Stars) {
		t.line("No star window: %s.", d.NoWindow)
		t.programme(d, kinds)
	}
	if slices.Contains(kinds, Daily) {
		t.events(d)
	}
	if d.NoWindow == "" || !slices.Contains(kinds, Stars) {
		t.programme(d, kinds)
	}
	if slices.Contains(kinds, Stars) {
		for i := range d.Windows {
			t.window(&d.Windows[i])
		}
	}
}

func (t *text) events(d *Day) {
	if len(d.Events) > 0 {
		t.line("")
		t.line(" ship   UTC on     event             DR position")
	}
	for _, e := range d.Events {
		t.line("%s  %s  %-16s  %v", t.ship(e.Time), t.minute(e.Time).Format("15:04 on 02"), e.Kind.Words(), e.Position)
	}
}

// Minute rounds an instant to a minute, but not over into another ship's date;
// shipTime gives an instant by the ship's clock.
func Minute(at time.Time, shipTime func(time.Time) time.Time) time.Time {
	if r := minuteOf(at); shipTime(r).Day() == shipTime(at).Day() {
		return r
	}
	return at.Truncate(time.Minute).UTC()
}

func (t *text) minute(at time.Time) time.Time { return Minute(at, t.shipTime) }

func (t *text) clock(at time.Time) time.Time { return t.shipTime(t.minute(at)) }
func (t *text) ship(at time.Time) string     { return t.clock(at).Format("15:04") }

// fromTo writes a span within a day, or over midnight: "22:40 to 01:24 on 17".
func fromTo(a, b time.Time) string {
	if a.Day() == b.Day() {
		return a.Format("15:04") + b.Format(" to 15:04")
	}
	return a.Format("15:04") + b.Format(" to 15:04 on 02")
}

func (t *text) window(w *Window) {
	t.line("")
	t.line("%s  %s ship, %s UTC", t.strong(strings.ToUpper(w.Kind.Words())),
		fromTo(t.clock(w.Begin), t.clock(w.End)), fromTo(t.minute(w.Begin), t.minute(w.End)))
	t.line("Best at %s ship, %s UTC.  DR %v", t.ship(w.Best), t.minute(w.Best).Format("15:04"), w.Fix.Position)
	if w.Fix.SpeedKn == 0 {
		t.line("Lying still; bearings from the bow are for her heading as she came, %s.", dm.Bearing(w.Fix.Course))
	} else {
		t.line("Course %s, %.1f kn.", dm.Bearing(w.Fix.Course), w.Fix.SpeedKn)
	}
	if !w.Usable[0].IsZero() {
		t.line("Three bodies and more over a usable horizon from %s to %s ship.", t.ship(w.Usable[0]), t.ship(w.Usable[1]))
	}
	t.sights(w)
}

// sights prints what can be shot in a window.
func (t *text) sights(w *Window) {
	if c := w.Comment(); c != "" {
		t.line("Here: %s.", c)
	}
	for _, warning := range w.Warnings {
		t.line("Mind: %s.", warning)
	}
	t.round(w)
	t.triads(w)
	t.bodies(w)
}
