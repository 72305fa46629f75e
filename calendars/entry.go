package calendars

import (
	"fmt"
	"slices"
	"time"

	ics "github.com/arran4/golang-ical"

	"gloam/plan"
)

// entry is an event of the calendar before it is written.
type entry struct {
	id                   string // the UID's part before the voyage
	begin, end           time.Time
	allDay               bool // begin and end are dates
	summary, description string
	item                 *plan.Item
	offset               time.Duration // ship's time less UTC
}

// entries are the events of a plan for the kinds of item asked for. A calendar
// must hold something (RFC 5545, 3.6): where there is nothing, one event lasts
// the voyage and says why.
func entries(p *plan.Plan, opt Options) []entry {
	var all []entry
	for i := range p.Days {
		d := &p.Days[i]
		for j := range d.Programme {
			if item := &d.Programme[j]; slices.Contains(opt.kinds(), item.Kind) {
				all = append(all, newEntry(p, d, item))
			}
		}
	}
	if len(all) == 0 {
		all = append(all, entry{
			id: "no-window", begin: p.Passage.Departure, end: p.Passage.Arrival.Add(time.Second),
			summary: "No star window on this voyage", description: none(p),
		})
	}
	return all
}

func newEntry(p *plan.Plan, d *plan.Day, item *plan.Item) entry {
	e := entry{id: item.ID, begin: item.Begin, end: item.End, summary: item.Title, item: item, offset: d.Offset}
	switch {
	case item.Window != nil:
		w := item.Window
		e.begin, e.end, e.summary, e.description = w.Begin, w.End, w.Title(), description(p, d, w)
	case item.Kind == plan.Daily:
		e.allDay, e.begin, e.end = true, d.Date, d.Date.AddDate(0, 0, 1)
		fallthrough
	default:
		e.description = itemDescription(p, d, item)
	}
	return e
}

// event adds an entry to a calendar.
func (e *entry) event(cal *ics.Calendar, voyage string, opt Options) {
	v := cal.AddEvent(e.id + "-" + voyage + uidEnd)
	v.SetDtStampTime(opt.Stamp)
	if e.allDay {
		v.SetAllDayStartAt(e.begin)
		v.SetAllDayEndAt(e.end)
	} else {
		v.SetStartAt(e.start())
		v.SetEndAt(e.finish())
	}
	v.SetSequence(0)
	v.SetSummary(clean(e.summary))
	v.SetDescription(clean(e.description))
	v.AddCategory("SIGHTS")
	v.SetTimeTransparency(ics.TransparencyTransparent)
	if opt.Busy && !e.allDay {
		v.SetTimeTransparency(ics.TransparencyOpaque)
	}
	if item := e.item; item != nil {
		v.SetLocation(item.Fix.Position.String())
		v.SetGeo(fmt.Sprintf("%.6f", item.Fix.Lat.Deg()), fmt.Sprintf("%.6f", item.Fix.Lon.Deg()))
		v.AddCategory(e.category())
		e.addAlarms(v, opt)
	}
	v.AddProperty(stateProperty, e.state().String())
	v.AddProperty(textProperty, textHash(clean(e.summary), clean(e.description)))
}

// category is the kind of item or window in words.
func (e *entry) category() string {
	if e.item.Window != nil {
		return e.item.Window.Kind.Words()
	}
	return string(e.item.Kind)
}

// start and finish are whole seconds, one apart at least.
func (e *entry) start() time.Time { return whole(e.begin) }

func (e *entry) finish() time.Time {
	if end := whole(e.end); end.After(e.start()) {
		return end
	}
	return e.start().Add(time.Second)
}

func whole(t time.Time) time.Time { return t.UTC().Round(time.Second) }

// addAlarms adds an alarm for each time before the beginning, but none to
// whole days.
func (e *entry) addAlarms(v *ics.VEvent, opt Options) {
	if e.allDay {
		return
	}
	for _, before := range opt.Alarms {
		a := v.AddAlarm()
		a.SetAction(ics.ActionDisplay)
		a.SetTrigger(trigger(before))
		a.SetDescription(clean(e.summary))
		a.AddProperty(alarmProperty, "1")
	}
}

// trigger writes a duration as one ahead of the event's start.
func trigger(d time.Duration) string {
	seconds := int(d.Round(time.Second).Seconds())
	if seconds%60 == 0 {
		return fmt.Sprintf("-PT%dM", seconds/60)
	}
	return fmt.Sprintf("-PT%dS", seconds)
}
