package plan

import (
	"bytes"
	"fmt"
	"io"
	"sort"
	"strings"
	"time"
	"unicode/utf8"

	"gloam/astro"
	"gloam/track"
	"gloam/track/dm"
)

// textWidth is how wide a line of text grows at most, but for long names.
const textWidth = 78

// WriteText prints the plan for a person: the voyage, then for each ship's
// date the events, the Moon, and the windows. Times are given by the ship's
// clock and in UTC, to the minute. With bold, headings are set off by terminal
// codes.
func (p *Plan) WriteText(w io.Writer, bold bool) error {
	t := &text{plan: p, bold: bold}
	t.voyage()
	for i := range p.Days {
		change := ""
		if i > 0 {
			change = clockChange(p.Days[i-1].Day, p.Days[i].Day)
		}
		t.day(&p.Days[i], change)
	}
	t.heading("CAUTIONS", "")
	for _, c := range Cautions {
		t.line("%s", c)
	}
	_, err := w.Write(t.Bytes())
	return err
}

// text is the print so far.
type text struct {
	bytes.Buffer
	plan *Plan
	bold bool
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

func (t *text) voyage() {
	p, set := t.plan.Passage, t.plan.Settings
	name := p.Name
	if name == "" {
		name = "Voyage"
	}
	first, last := p.Legs[0].From, p.Legs[len(p.Legs)-1].To
	t.line("%s", t.strong(name))
	t.line("From      %s  %s", t.dateTimes(p.Departure), first.Label())
	t.line("To        %s  %s", t.dateTimes(p.Arrival), last.Label())
	t.line("Distance  %.1f NM at %.1f kn by %s: %s", p.DistanceNM, p.SpeedKn, p.Legs[0].Sailing, spanText(p.Arrival.Sub(p.Departure)))
	t.line("Sextant   eye %.1f m (dip %.1f'), index error %.1f', air %.0f °C %.0f hPa",
		set.EyeM, set.Dip().Min(), set.IndexError.Min(), set.TemperatureC, set.PressureHPa)
	t.line("Sky       bodies from %s to %s high, Sun from %s to %s",
		wholeDegrees(set.LowestAltitude), wholeDegrees(set.HighestAltitude), wholeDegrees(set.UpperSun), wholeDegrees(set.LowerSun))
	t.line("")
	t.line("Leg  Course    Miles  ETD (UTC)         To")
	for i, l := range p.Legs {
		t.line("%3d  %s  %7.1f  %s  %s", i+1, dm.Course(l.Course), l.DistanceNM, minuteOf(p.ETD(i)).Format("2006-01-02 15:04"), l.To.Label())
	}
	if p.Legs[0].Sailing == track.GreatCircle {
		t.line("     Great-circle courses are initial ones.")
	}
	for _, n := range t.plan.Notes {
		t.line("Note: %s", n)
	}
}

// dateTimes gives an instant in UTC and by the ship's clock.
func (t *text) dateTimes(at time.Time) string {
	at = minuteOf(at)
	return fmt.Sprintf("%s UTC, %s ship", at.UTC().Format("2006-01-02 15:04"), t.plan.Clock.At(at).Format("01-02 15:04"))
}

func minuteOf(t time.Time) time.Time { return t.Round(time.Minute).UTC() }

// spanText writes a duration in days and hours: "14 d 22 h".
func spanText(d time.Duration) string {
	hours := int(d.Round(time.Hour).Hours())
	return fmt.Sprintf("%d d %d h", hours/24, hours%24)
}

func (t *text) day(d *Day, clockChange string) {
	t.heading(strings.ToUpper(d.Date.Format("Monday 2 January 2006")), "ship's time "+ZoneText(d.Offset))
	if clockChange != "" {
		t.line("%s.", clockChange)
	}
	t.line("Moon %s.", d.Moon.Words())
	if len(d.Events) > 0 {
		t.line("")
		t.line(" ship   UTC on     event             DR position")
	}
	for _, e := range d.Events {
		t.line("%s  %s  %-16s  %v", t.ship(e.Time), utcText(e.Time), e.Kind.Words(), e.Position)
	}
	for i := range d.Windows {
		t.window(&d.Windows[i])
	}
	if d.NoWindow != "" {
		t.noWindow(d)
	}
}

func (t *text) clock(at time.Time) time.Time { return t.plan.Clock.At(minuteOf(at)) }
func (t *text) ship(at time.Time) string     { return t.clock(at).Format("15:04") }

// fromTo writes a span within a day, or over midnight: "22:40 to 01:24 on 17".
func fromTo(a, b time.Time) string {
	if a.Day() == b.Day() {
		return a.Format("15:04") + b.Format(" to 15:04")
	}
	return a.Format("15:04") + b.Format(" to 15:04 on 02")
}

// utcText gives time and day of the month in UTC: "18:32 on 20".
func utcText(at time.Time) string { return minuteOf(at).Format("15:04 on 02") }

func (t *text) noWindow(d *Day) {
	t.line("")
	t.line("No star window: %s.", d.NoWindow)
	if len(d.Remains) == 0 {
		t.line("Nothing else stands between the altitude limits.")
	}
	for _, r := range d.Remains {
		note := ""
		if r.Body == astro.Venus {
			note = "; never sweep the telescope near the Sun"
		}
		t.line("To shoot: %-6s %s high at %s ship, %s UTC%s", r.Body, dm.Altitude(r.Altitude),
			t.ship(r.Highest), minuteOf(r.Highest).Format("15:04"), note)
	}
}

func (t *text) window(w *Window) {
	t.line("")
	t.line("%s  %s ship, %s UTC", t.strong(strings.ToUpper(w.Kind.Words())),
		fromTo(t.clock(w.Begin), t.clock(w.End)), fromTo(minuteOf(w.Begin), minuteOf(w.End)))
	t.line("Best at %s ship, %s UTC.  DR %v", t.ship(w.Best), minuteOf(w.Best).Format("15:04"), w.Fix.Position)
	t.line("Course %s, %.1f kn.", dm.Bearing(w.Fix.Course), w.Fix.SpeedKn)
	if c := w.Comment(); c != "" {
		t.line("Here: %s.", c)
	}
	t.triads(w)
	t.bodies(w)
}

func (t *text) triads(w *Window) {
	if len(w.Triads) == 0 {
		return
	}
	t.line("")
	t.line("Triad                                gaps      error  95 %% ellipse, NM")
	for i, tr := range w.Triads {
		e := tr.Covariance.Ellipse()
		t.line("%d  %-32s  %3.0f-%3.0f°  %.2f  %.1f x %.1f along %s", i+1, tr.Names(),
			tr.LeastGap.Deg(), tr.GreatestGap.Deg(), tr.Covariance.ExpectedError(),
			e.SemiMajorNM, e.SemiMinorNM, dm.Bearing(e.Axis))
	}
}

// Names gives the three bodies' names, in order of azimuth.
func (tr Triad) Names() string {
	return fmt.Sprintf("%v, %v, %v", tr.Bodies[0], tr.Bodies[1], tr.Bodies[2])
}

// bodies prints those of the triads listed, and all of them where there is no
// triad; the others follow in one paragraph.
func (t *text) bodies(w *Window) {
	var others []string
	t.line("")
	t.line("Body              set Hs     Zn    Hc          mag  in triads")
	for _, c := range w.Bodies {
		if !w.Listed(c.Body) {
			others = append(others, fmt.Sprintf("%v %.0f° %s", c.Body, c.Altitude.Deg(), dm.Bearing(c.Azimuth)))
			continue
		}
		t.line("%-16s  %s  %s  %s  %5.1f  %s", c.Label(), dm.Altitude(c.Preset), dm.Bearing(c.Azimuth), dm.Altitude(c.Altitude), c.Magnitude, w.in(c.Body))
	}
	if len(others) > 0 {
		sort.Strings(others)
		t.paragraph("Also up (Hc, Zn):", others)
	}
}

// Label names the body, and for the Moon the limb to bring to the horizon.
func (c Candidate) Label() string {
	if c.Limb == astro.Centre {
		return c.Body.String()
	}
	return fmt.Sprintf("%v %v limb", c.Body, c.Limb)
}

// Listed tells whether a body belongs to a triad listed, or there is none.
func (w *Window) Listed(b astro.Body) bool { return len(w.Triads) == 0 || w.in(b) != "" }

// in lists the numbers of the triads a body belongs to.
func (w *Window) in(b astro.Body) string {
	var in []string
	for i, tr := range w.Triads {
		for _, other := range tr.Bodies {
			if other == b {
				in = append(in, fmt.Sprint(i+1))
			}
		}
	}
	return strings.Join(in, " ")
}

// paragraph prints items, which are not broken, in lines of the text's width.
func (t *text) paragraph(lead string, items []string) {
	line := lead
	for i, item := range items {
		if i+1 < len(items) {
			item += ","
		}
		if utf8.RuneCountInString(line)+1+utf8.RuneCountInString(item) > textWidth {
			t.line("%s", line)
			line = " "
		}
		line += " " + item
	}
	t.line("%s", line)
}
