package calendars

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"time"

	"gloam/plan"
)

// ours are the properties that change with an event; all others in it are left
// as the user or his program has them.
var ours = []string{"DTSTAMP", "DTSTART", "DTEND", "DURATION", "SEQUENCE", "LAST-MODIFIED", "STATUS", "SUMMARY", "DESCRIPTION", "LOCATION", "GEO", stateProperty, textProperty, cancelProperty}

// Update brings an earlier calendar of the voyage up to date with a plan, and
// tells what changed. Events in which a person would notice nothing new keep
// their bytes; the others keep their UID, alarms and whatever else was added to
// them, and what was written into their text follows the new one. Events that
// the plan has no longer are cancelled, those that ended before opt.Stamp are
// left alone. Updating again changes nothing.
//
// Kinds of event that the old calendar has are kept up where opt names none.
//
// An error tells that old is no calendar of this voyage, or a damaged one.
func Update(w io.Writer, old io.Reader, p *plan.Plan, opt Options) (Changes, error) {
	cal, err := readLines(old)
	if err != nil {
		return nil, err
	}
	u := &update{stamp: opt.Stamp.UTC().Truncate(time.Second)}
	if u.known, err = eventsOf(cal, "-"+voyageKey(p.Passage)+uidEnd); err != nil {
		return nil, err
	}
	if len(opt.Include) == 0 {
		opt.Include = u.known.kinds()
	}
	data, err := serialise(p, opt)
	if err != nil {
		return nil, err
	}
	fresh, err := readLines(bytes.NewReader(data))
	if err != nil {
		return nil, err
	}
	for _, event := range fresh.parts("VEVENT") {
		u.bring(cal, event)
	}
	u.cancelRest()
	var b bytes.Buffer
	cal.write(&b)
	_, err = w.Write(b.Bytes())
	return u.changes.inOrder(), err
}

// eventsOf finds a voyage's events by their UIDs.
func eventsOf(cal *part, suffix string) (*events, error) {
	all := &events{byUID: map[string]*part{}}
	others := false
	for _, e := range cal.parts("VEVENT") {
		uid := e.value("UID")
		switch {
		case strings.HasSuffix(uid, suffix) && all.byUID[uid] != nil:
			return nil, fmt.Errorf("two events have the UID %s (one)", uid)
		case strings.HasSuffix(uid, suffix):
			all.uids, all.byUID[uid] = append(all.uids, uid), e
		default:
			others = others || strings.HasSuffix(uid, uidEnd)
		}
	}
	switch {
	case len(all.uids) > 0:
		return all, nil
	case others:
		return nil, errors.New("it is another voyage's calendar (one written for this voyage, by its name)")
	}
	return nil, errors.New("no event of gloam in it (a calendar that gloam wrote for this voyage)")
}

// events are a voyage's events in a calendar, in its order.
type events struct {
	uids  []string
	byUID map[string]*part
}

// kinds are the kinds of item that the events are of, by their UIDs: the ship's
// date, then a kind of window or the kind itself.
func (e *events) kinds() (kinds []plan.ItemKind) {
	for _, k := range plan.ItemKinds {
		for _, uid := range e.uids {
			_, rest, _ := cutDate(uid)
			if strings.HasPrefix(rest, string(k)+"-") || k == plan.Stars && strings.Contains(rest, "-stars-") {
				kinds = append(kinds, k)
				break
			}
		}
	}
	return kinds
}

// cutDate cuts a UID after the date it begins with.
func cutDate(uid string) (date, rest string, ok bool) {
	if len(uid) <= len(time.DateOnly) || uid[len(time.DateOnly)] != '-' {
		return "", uid, false
	}
	return uid[:len(time.DateOnly)], uid[len(time.DateOnly)+1:], true
}

type update struct {
	known   *events
	stamp   time.Time
	seen    map[string]bool
	changes Changes
}

// bring puts one event of the new plan into the calendar.
func (u *update) bring(cal, event *part) {
	uid := event.value("UID")
	now, _ := parseState(event.value(stateProperty))
	if u.seen == nil {
		u.seen = map[string]bool{}
	}
	u.seen[uid] = true
	old := u.known.byUID[uid]
	switch {
	case old == nil && now.end.After(u.stamp):
		cal.items = append(cal.items, item{part: event})
		u.note(Gained, event, state{}, now)
	case old != nil && !u.past(old):
		u.renew(old, event, now)
	}
}

// past tells whether an event is over.
func (u *update) past(e *part) bool {
	end := timeOf(e, "DTEND")
	return !end.IsZero() && !end.After(u.stamp)
}

// timeOf reads a property that is a time in UTC or a date; zero where it is
// neither.
func timeOf(e *part, name string) time.Time {
	for _, layout := range []string{stateTime, "20060102"} {
		if t, err := time.Parse(layout, e.value(name)); err == nil {
			return t
		}
	}
	return time.Time{}
}

// stateOf is the state that an event keeps; known is false where a program has
// dropped it, and only its times are left.
func stateOf(e *part) (s state, known bool) {
	if s, known = parseState(e.value(stateProperty)); !known {
		s = state{begin: timeOf(e, "DTSTART"), best: timeOf(e, "DTSTART"), end: timeOf(e, "DTEND")}
	}
	return s, known
}

// renew brings an event up to date where a person would notice it.
func (u *update) renew(old, event *part, now state) {
	was, known := stateOf(old)
	cancelled := strings.EqualFold(old.value("STATUS"), "CANCELLED")
	switch {
	case cancelled && old.value(cancelProperty) == "": // by a person, whose word it is
		return
	case cancelled:
		for _, alarm := range event.parts("VALARM") {
			old.items = append(old.items, item{part: alarm})
		}
		u.note(Back, event, was, now)
	case known && !was.differs(now) || !known && old.value("DTSTART") == event.value("DTSTART") && old.value("DTEND") == event.value("DTEND") && old.text("SUMMARY") == event.text("SUMMARY"):
		return
	case was.moved(now):
		u.note(Moved, event, was, now)
	default:
		u.note(Altered, event, was, now)
	}
	summary, description := event.text("SUMMARY"), event.text("DESCRIPTION")
	if notes := userNotes(old, summary, description); len(notes) > 0 {
		description += "\n\nNoted before:\n" + strings.Join(notes, "\n")
	}
	u.rewrite(old, event, description)
}

// rewrite puts an event's own properties in place of the old ones.
func (u *update) rewrite(old, event *part, description string) {
	sequence := nextSequence(old)
	old.drop(ours...)
	var lines []item
	for _, i := range event.items {
		if i.part == nil && has(ours, i.line.name) && i.line.name != "SEQUENCE" && i.line.name != "DESCRIPTION" {
			lines = append(lines, i)
		}
	}
	lines = append(lines, newLine("SEQUENCE", sequence), newLine("LAST-MODIFIED", u.stamp.Format(stateTime)), newLine("DESCRIPTION", escape(description)))
	old.items = append(lines, old.items...)
}

// cancelRest cancels what the plan has no longer.
func (u *update) cancelRest() {
	for _, uid := range u.known.uids {
		e := u.known.byUID[uid]
		if u.seen[uid] || u.past(e) || strings.EqualFold(e.value("STATUS"), "CANCELLED") {
			continue
		}
		was, _ := stateOf(e)
		u.note(Lost, e, was, state{})
		sequence := nextSequence(e)
		e.drop("DTSTAMP", "SEQUENCE", "STATUS", "LAST-MODIFIED")
		e.dropOwnAlarms() // none for what is not
		stamp := u.stamp.Format(stateTime)
		e.items = append([]item{newLine("DTSTAMP", stamp), newLine("SEQUENCE", sequence), newLine("LAST-MODIFIED", stamp), newLine("STATUS", "CANCELLED"), newLine(cancelProperty, "1")}, e.items...)
	}
}

// nextSequence counts an event's SEQUENCE on, to the greatest there is (RFC 5545,
// 3.3.8).
func nextSequence(e *part) string {
	n, err := strconv.Atoi(e.value("SEQUENCE"))
	if err != nil || n < 0 {
		n = 0
	}
	return strconv.Itoa(min(n+1, math.MaxInt32))
}

// userNotes are the lines that the user wrote into an event: its title, if it
// was changed, and the lines of its text that are none of gloam's. An event
// whose text is as it was written has none.
func userNotes(old *part, summary, description string) (notes []string) {
	title, text := old.text("SUMMARY"), old.text("DESCRIPTION")
	if hash := old.value(textProperty); hash == "" || textHash(title, text) == hash {
		return nil
	}
	known := map[string]bool{"": true, "Noted before:": true}
	for _, l := range strings.Split(description+"\n"+summary, "\n") {
		known[form(l)] = true
	}
	for _, l := range append([]string{title}, strings.Split(text, "\n")...) {
		if l = strings.TrimSpace(l); !known[form(l)] && !isOurs(l) {
			notes = append(notes, l)
		}
	}
	return notes
}
