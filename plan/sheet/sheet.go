package sheet

import (
	"bytes"
	_ "embed"
	"fmt"
	"html/template"
	"io"
	"math"
	"slices"
	"strings"
	"time"

	"gloam/plan"
	"gloam/track/dm"
)

// Options are what a sheet depends on beside the plan.
type Options struct {
	Kinds    []plan.ItemKind // of the programme; plan.UsualKinds where it is empty
	Overhead bool            // sky discs as seen looking up, east to the left
}

//go:embed style.css
var style string

//go:embed page.tmpl
var pageText string

var page = template.Must(template.New("page").Parse(pageText))

// Write writes the plan as one HTML page. The same plan and options give the
// same bytes.
func Write(w io.Writer, p *plan.Plan, opt Options) error {
	if len(opt.Kinds) == 0 {
		opt.Kinds = plan.UsualKinds
	}
	var b bytes.Buffer
	if err := page.Execute(&b, newSheet(p, opt)); err != nil {
		return err
	}
	_, err := w.Write(b.Bytes())
	return err
}

// sheetView is what the page's template shows.
type sheetView struct {
	Style    template.CSS
	Title    string
	Head     []row
	Legs     []legRow
	Notes    []string
	Cautions []string
	Ribbons  []template.HTML
	Chart    template.HTML
	Days     []dayView
}

// row is a name and a value.
type row struct{ Name, Value string }

type legRow struct{ Number, Course, Miles, Knots, ETD, ETA, To string }

// dayView is a ship's date.
type dayView struct {
	ID, Short, Title, Zone, Moon string
	MoonPicture                  template.HTML
	Changes                      []string
	NoWindow                     string
	Events                       []eventRow
	Items                        []itemView
	Windows                      []windowView
}

type eventRow struct{ Ship, UTC, Words, DR string }

// itemView is an item of the programme.
type itemView struct {
	Ship, UTC, Title, Error string
	Sights                  []sightRow
	Words                   []string
}

type sightRow struct {
	Number, Ship, UTC, Body, Preset, Zn, Bow, Rate, Late string
}

// windowView is a star window.
type windowView struct {
	ID, Title, Times, DR, Usable, Comment, Short, Fix string
	Warnings                                          []string
	Round                                             []sightRow
	Others                                            string
	North, BowUp, Picture                             template.HTML
	HasRound                                          bool
}

// builder makes the views.
type builder struct {
	plan *plan.Plan
	opt  Options
}

func newSheet(p *plan.Plan, opt Options) *sheetView {
	b := &builder{p, opt}
	title := p.Passage.Name
	if title == "" {
		title = "Voyage"
	}
	v := &sheetView{Style: template.CSS(style), Title: title, Head: b.head(), Legs: b.legs(), Notes: p.Notes, Cautions: plan.Cautions, Chart: chart("chart", p)}
	const ribbonDays = 35
	for i := 0; i < len(p.Days); i += ribbonDays {
		v.Ribbons = append(v.Ribbons, ribbon(fmt.Sprintf("r%d", i), p, p.Days[i:min(i+ribbonDays, len(p.Days))]))
	}
	for i := range p.Days {
		v.Days = append(v.Days, b.day(i))
	}
	return v
}

func (b *builder) head() []row {
	p, set := b.plan.Passage, &b.plan.Settings
	return []row{
		{"From", b.dateTimes(p.Departure) + ", " + p.Legs[0].From.Label()},
		{"To", b.dateTimes(p.Arrival) + ", " + p.Legs[len(p.Legs)-1].To.Label()},
		{"Distance", fmt.Sprintf("%.1f NM", p.DistanceNM)},
		{"Sextant", fmt.Sprintf("eye %.1f m (dip %.1f'), index error %.1f', air %.0f °C %.0f hPa", set.EyeM, set.Dip().Min(), set.IndexError.Min(), set.TemperatureC, set.PressureHPa)},
	}
}

// legsShown is how many legs the sheet lists at most.
const legsShown = 30

func (b *builder) legs() (rows []legRow) {
	number := 0
	for _, l := range b.plan.Passage.Legs {
		if len(rows) == legsShown {
			return append(rows, legRow{To: fmt.Sprintf("and %d more", len(b.plan.Passage.Legs)-legsShown)})
		}
		r := legRow{ETD: l.ETD.Round(time.Minute).Format("01-02 15:04"), ETA: l.ETA.Round(time.Minute).Format("01-02 15:04"), To: l.To.Label()}
		if l.Stays() {
			r.Course = "stays"
		} else {
			number++
			r.Number, r.Course, r.Miles, r.Knots = fmt.Sprint(number), dm.Course(l.Course), fmt.Sprintf("%.1f", l.DistanceNM), fmt.Sprintf("%.1f", l.SpeedKn)
		}
		rows = append(rows, r)
	}
	return rows
}

func (b *builder) minute(t time.Time) time.Time { return plan.Minute(t, b.plan.Clock.At) }

func (b *builder) ship(t time.Time) string {
	return b.plan.Clock.At(b.minute(t)).Format("15:04")
}

func (b *builder) utc(t time.Time) string { return b.minute(t).Format("15:04") }

func (b *builder) dateTimes(t time.Time) string {
	at := b.minute(t)
	return at.Format("2006-01-02 15:04 UTC") + ", " + b.plan.Clock.At(at).Format("01-02 15:04 ship")
}

func (b *builder) day(i int) dayView {
	d := &b.plan.Days[i]
	v := dayView{
		ID: fmt.Sprintf("d%d", i), Short: d.Date.Format("2 Jan"), Title: d.Date.Format("Monday 2 January 2006"), Zone: plan.ZoneText(d.Offset),
		Moon: d.Moon.Words(), MoonPicture: moon(fmt.Sprintf("m%d", i), d.Moon), NoWindow: d.NoWindow,
	}
	for _, c := range d.Changes {
		v.Changes = append(v.Changes, plan.ChangeText(c))
	}
	for _, e := range d.Events {
		v.Events = append(v.Events, eventRow{b.ship(e.Time), b.minute(e.Time).Format("15:04 on 02"), e.Kind.Words(), e.Position.String()})
	}
	for k := range d.Programme {
		if item := &d.Programme[k]; item.Kind != plan.Stars && item.Kind != plan.Daily && slices.Contains(b.opt.Kinds, item.Kind) {
			v.Items = append(v.Items, b.item(item))
		}
	}
	if slices.Contains(b.opt.Kinds, plan.Stars) {
		for k := range d.Windows {
			v.Windows = append(v.Windows, b.window(&d.Windows[k], fmt.Sprintf("w%d-%d", i, k)))
		}
	}
	return v
}

func (b *builder) item(item *plan.Item) itemView {
	v := itemView{Ship: b.ship(item.Best), UTC: b.utc(item.Best), Title: item.Title, Words: item.Words}
	if item.ExpectedNM > 0 {
		v.Error = fmt.Sprintf("%.2f NM", item.ExpectedNM)
	}
	for i := range item.Sights {
		v.Sights = append(v.Sights, b.sight(&item.Sights[i]))
	}
	return v
}

func (b *builder) sight(r *plan.RoundSight) sightRow {
	return sightRow{
		Ship: b.plan.Clock.At(r.Time).Format("15:04:05"), UTC: r.Time.Format("15:04"), Body: r.Label(), Preset: dm.Altitude(r.Preset),
		Zn: dm.Bearing(r.Azimuth), Bow: dm.Bearing(r.Relative), Rate: fmt.Sprintf("%+.1f'", r.Rate.Min()), Late: dm.Altitude(r.Late),
	}
}

func (b *builder) window(w *plan.Window, id string) windowView {
	set := &b.plan.Settings
	v := windowView{
		ID: id, Title: w.Kind.Words(), DR: w.Fix.Position.String(), Comment: w.Comment(), Warnings: w.Warnings,
		Times: fmt.Sprintf("%s to %s ship, %s to %s UTC, best at %s", b.ship(w.Begin), b.ship(w.End), b.utc(w.Begin), b.utc(w.End), b.ship(w.Best)),
		North: Disc(id+"n", w, set, false, b.opt.Overhead), BowUp: Disc(id+"b", w, set, true, b.opt.Overhead), Picture: fixPicture(id+"f", w),
		HasRound: len(w.Round) > 0,
	}
	if !w.Usable[0].IsZero() {
		v.Usable = fmt.Sprintf("three bodies and more over a usable horizon from %s to %s ship", b.ship(w.Usable[0]), b.ship(w.Usable[1]))
	}
	three := w.BestThree(set)
	var names []string
	for _, r := range three {
		names = append(names, r.Body.String())
	}
	v.Short = strings.Join(names, ", ")
	for i := range w.Round {
		row := b.sight(&w.Round[i])
		row.Number = fmt.Sprint(i + 1)
		v.Round = append(v.Round, row)
	}
	if x := w.RoundFix.Covariance.ExpectedError(); len(w.Round) > 1 && !math.IsInf(x, 0) {
		v.Fix = fmt.Sprintf("expected error %.2f NM, 95 %% ellipse %s", x, w.RoundFix.Covariance.Ellipse())
	}
	v.Others = others(w)
	return v
}

// others are the bodies that are not in the round.
func others(w *plan.Window) string {
	var all []string
	for _, c := range w.Bodies {
		if !slices.ContainsFunc(w.Round, func(r plan.RoundSight) bool { return r.Body == c.Body }) {
			all = append(all, fmt.Sprintf("%s %s %s", c.Label(), dm.Altitude(c.Preset), dm.Bearing(c.Azimuth)))
		}
	}
	return strings.Join(all, "; ")
}
