package calendars

import (
	"bytes"
	"crypto/sha256"
	"fmt"
	"io"
	"strings"
	"time"

	ics "github.com/arran4/golang-ical"

	"gloam/plan"
	"gloam/track"
)

// Options are what a calendar depends on beside the plan.
type Options struct {
	Alarm time.Duration // before a window begins; 0 for no alarm, never below 0
	Stamp time.Time     // DTSTAMP of every event
}

const productID = "-//gloam//voyage sights//EN"

// Write writes the plan's windows as a calendar. The same plan and options
// give the same bytes. A window keeps its UID when the voyage, known by its
// name or where it has none by its ends, is planned again and the window falls
// on the same ship's date.
func Write(w io.Writer, p *plan.Plan, opt Options) error {
	if opt.Alarm < 0 {
		return fmt.Errorf("alarm %v before the window (0 or more)", opt.Alarm)
	}
	cal := ics.NewCalendarFor("gloam")
	cal.SetProductId(productID)
	cal.SetCalscale("GREGORIAN")
	cal.SetXWRCalName(plainName(p.Passage))
	voyage := voyageKey(p.Passage)
	for i := range p.Days {
		for j := range p.Days[i].Windows {
			addEvent(cal, p, &p.Days[i], &p.Days[i].Windows[j], voyage, opt)
		}
	}
	if len(cal.Events()) == 0 {
		addNone(cal, p, voyage, opt)
	}
	var b bytes.Buffer
	if err := cal.SerializeTo(&b, ics.WithNewLineWindows); err != nil {
		return err
	}
	_, err := w.Write(b.Bytes())
	return err
}

// addEvent adds the event of one window.
func addEvent(cal *ics.Calendar, p *plan.Plan, d *plan.Day, w *plan.Window, voyage string, opt Options) {
	begin, end := whole(w.Begin), whole(w.End)
	if !end.After(begin) {
		end = begin.Add(time.Second)
	}
	e := cal.AddEvent(w.ID + "-" + voyage + "@gloam")
	e.SetDtStampTime(opt.Stamp)
	e.SetStartAt(begin)
	e.SetEndAt(end)
	e.SetSequence(0)
	e.SetSummary(summary(w))
	e.SetDescription(clean(description(p, d, w)))
	e.SetLocation(w.Fix.Position.String())
	e.SetGeo(fmt.Sprintf("%.6f", w.Fix.Lat.Deg()), fmt.Sprintf("%.6f", w.Fix.Lon.Deg()))
	e.AddCategory("SIGHTS")
	e.AddCategory(w.Kind.Words())
	e.SetTimeTransparency(ics.TransparencyTransparent)
	if opt.Alarm >= time.Second {
		a := e.AddAlarm()
		a.SetAction(ics.ActionDisplay)
		a.SetTrigger(before(opt.Alarm))
		a.SetDescription(summary(w))
	}
}

// addNone adds the one event of a voyage without windows, since a calendar must
// hold something (RFC 5545, 3.6): it lasts the voyage and says why.
func addNone(cal *ics.Calendar, p *plan.Plan, voyage string, opt Options) {
	e := cal.AddEvent("no-window-" + voyage + "@gloam")
	e.SetDtStampTime(opt.Stamp)
	e.SetStartAt(whole(p.Passage.Departure))
	e.SetEndAt(whole(p.Passage.Arrival).Add(time.Second))
	e.SetSequence(0)
	e.SetSummary("No star window on this voyage")
	e.SetDescription(clean(none(p)))
	e.AddCategory("sights")
	e.SetTimeTransparency(ics.TransparencyTransparent)
}

// before writes a duration as a trigger ahead of the event's start.
func before(d time.Duration) string {
	seconds := int(d.Round(time.Second).Seconds())
	if seconds%60 == 0 {
		return fmt.Sprintf("-PT%dM", seconds/60)
	}
	return fmt.Sprintf("-PT%dS", seconds)
}

func whole(t time.Time) time.Time { return t.UTC().Round(time.Second) }

// voyageKey tells voyages apart in a UID: a hash of the name, or of the ends
// where there is none.
func voyageKey(p *track.Passage) string {
	key := p.Name
	if key == "" {
		from, to := p.Legs[0].From, p.Legs[len(p.Legs)-1].To
		key = fmt.Sprintf("%.2f %.2f %.2f %.2f", from.Lat.Deg(), from.Lon.Deg(), to.Lat.Deg(), to.Lon.Deg())
	}
	return fmt.Sprintf("%x", sha256.Sum256([]byte(key)))[:12]
}

// plainName is the calendar's name. Readers differ in how they take escaped
// characters there, so it has none.
func plainName(p *track.Passage) string {
	name := strings.NewReplacer(",", " ", ";", " ", `\`, " ", "\n", " ").Replace(clean(p.Name))
	if name = strings.Join(strings.Fields(name), " "); name == "" {
		return "Voyage sights"
	}
	return name + " - sights"
}
