package calendars

import (
	"fmt"
	"strings"
	"time"
	"unicode"

	"gloam/plan"
	"gloam/track"
	"gloam/track/dm"
)

// text gathers the lines of a description, kept short for a phone.
type text struct {
	strings.Builder
	plan *plan.Plan
}

func (t *text) line(format string, args ...any) { fmt.Fprintf(t, format+"\n", args...) }

// times gives an instant by the ship's clock and in UTC.
func (t *text) times(at time.Time) string {
	at = plan.Minute(at, t.plan.Clock.At)
	return t.plan.Clock.At(at).Format("15:04") + " ship " + at.UTC().Format("15:04") + " UTC"
}

func description(p *plan.Plan, d *plan.Day, w *plan.Window) string {
	t := &text{plan: p}
	t.line("%s", d.Date.Format("Monday 2 January 2006"))
	t.line("Ship's time %s", plan.ZoneText(d.Offset))
	t.line("")
	t.line("Begin %s", t.times(w.Begin))
	t.line("Best  %s", t.times(w.Best))
	t.line("End   %s", t.times(w.End))
	if !w.Usable[0].IsZero() {
		t.line("Use   %s", t.times(w.Usable[0]))
		t.line("until %s", t.times(w.Usable[1]))
	}
	for _, warning := range w.Warnings {
		t.line("Mind: %s", warning)
	}
	t.line("Sun from %.4g° to %.4g°", p.Settings.UpperSun.Deg(), p.Settings.LowerSun.Deg())
	t.line("DR %v", w.Fix.Position)
	t.way(w.Fix)
	t.line("")
	t.sun(w)
	t.bodies(w)
	t.cautions()
	return strings.TrimSpace(t.String())
}

// way tells how the ship goes.
func (t *text) way(fix track.Fix) {
	if fix.SpeedKn == 0 {
		t.line("Lying still, heading %s as she came", dm.Bearing(fix.Course))
		return
	}
	t.line("Course %s, %.1f kn", dm.Bearing(fix.Course), fix.SpeedKn)
}

func (t *text) cautions() {
	t.line("")
	for _, c := range plan.Cautions {
		t.line("%s", c)
	}
}

// itemDescription tells of an item that is no star window.
func itemDescription(p *plan.Plan, d *plan.Day, item *plan.Item) string {
	t := &text{plan: p}
	t.line("%s", d.Date.Format("Monday 2 January 2006"))
	t.line("Ship's time %s", plan.ZoneText(d.Offset))
	t.line("")
	if item.Kind != plan.Daily {
		t.line("Begin %s", t.times(item.Begin))
		t.line("Best  %s", t.times(item.Best))
		t.line("End   %s", t.times(item.End))
		t.line("DR %v", item.Fix.Position)
		t.way(item.Fix)
		t.line("")
	}
	if len(item.Sights) > 0 {
		t.line("Ship's time: set Hs, Zn, bow")
	}
	for i := range item.Sights {
		t.sight(&item.Sights[i])
	}
	for _, w := range item.Words {
		t.line("%s", w)
	}
	t.cautions()
	return strings.TrimSpace(t.String())
}

// none says for each date of a voyage why it has no window.
func none(p *plan.Plan) string {
	t := &text{plan: p}
	for _, d := range p.Days {
		t.line("%s: %s", d.Date.Format("2 January"), d.NoWindow)
	}
	t.cautions()
	return t.String()
}

// nearby is how far from a window an event still belongs to it.
const nearby = 2 * time.Hour

// sun lists the events close to the window.
func (t *text) sun(w *plan.Window) {
	for _, e := range t.plan.EventsBetween(w.Begin.Add(-nearby), w.End.Add(nearby)) {
		t.line("%s %s", plan.Capital(e.Kind.Words()), t.times(e.Time))
	}
}

// bodies lists the best triad and what to set for the bodies of all triads
// listed, or for all there are.
func (t *text) bodies(w *plan.Window) {
	t.line("")
	if c := w.Comment(); c != "" {
		t.line("%s", plan.Capital(c))
	}
	if len(w.Triads) > 0 {
		best := w.Triads[0]
		t.line("Best: %s", best.Names())
		t.line("Gaps %.0f° to %.0f°", best.LeastGap.Deg(), best.GreatestGap.Deg())
		t.line("Expected error %.2f NM", best.Covariance.ExpectedError())
		t.line("95 %% ellipse, NM: %s", best.Covariance.Ellipse())
	}
	t.line("")
	if len(w.Round) > 0 {
		t.line("Round, ship's time: set Hs, Zn, bow")
	}
	for i := range w.Round {
		t.sight(&w.Round[i])
	}
	if len(w.Bodies) == 0 {
		return
	}
	t.line("")
	t.line("At best: set Hs, Zn (Hc, magnitude)")
	for _, c := range w.Bodies {
		if w.Listed(c.Body) {
			t.line("%s %s Zn %s (%s, %.1f)", c.Label(), dm.Altitude(c.Preset), dm.Bearing(c.Azimuth), dm.Altitude(c.Altitude), c.Magnitude)
		}
	}
}

// sight prints what to set when.
func (t *text) sight(r *plan.RoundSight) {
	t.line("%s %s %s Zn %s bow %s", t.plan.Clock.At(r.Time).Format("15:04:05"), r.Label(), dm.Altitude(r.Preset), dm.Bearing(r.Azimuth), dm.Bearing(r.Relative))
}

var lineEnds = strings.NewReplacer("\r\n", "\n", "\r", "\n", "\u0085", "\n", "\u2028", "\n", "\u2029", "\n")

// clean makes a text fit for a calendar: valid UTF-8, line ends as LF, no
// other control characters but the tabulator, no blanks at the ends.
func clean(s string) string {
	s = lineEnds.Replace(strings.ToValidUTF8(s, "\uFFFD"))
	s = strings.Map(func(r rune) rune {
		if unicode.IsControl(r) && r != '\n' && r != '\t' {
			return -1
		}
		return r
	}, s)
	return strings.TrimSpace(s)
}
