package calendars

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"

	"gloam/plan"
)

// updated brings a calendar up to date, wants it well formed, and gives it with
// the changes, a line each.
func updated(t testing.TB, old []byte, p *plan.Plan, opt Options) ([]byte, []string) {
	t.Helper()
	var b bytes.Buffer
	changes, err := Update(&b, bytes.NewReader(old), p, opt)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := parse(b.Bytes()); err != nil {
		t.Fatal(err)
	}
	var lines []string
	for _, c := range changes {
		lines = append(lines, fmt.Sprintf("%s %s", c.Kind, c.Begin.Format("02T15:04")))
	}
	return b.Bytes(), lines
}

const sails = "2027-02-10T12:00:00Z"

func plain(t testing.TB, departure string) *plan.Plan {
	return voyage(t, "Yawl Sorrel", "Cascais", departure)
}

// later are options for an update a day after the first writing, before the
// voyage.
func later() Options {
	opt := usual
	opt.Stamp = stamp.Add(24 * time.Hour)
	return opt
}

// event finds an event by a part of its UID.
func eventOf(t testing.TB, data []byte, uid string) *component {
	t.Helper()
	cal, err := parse(data)
	if err != nil {
		t.Fatal(err)
	}
	var found *component
	for _, e := range cal.parts {
		if e.kind == "VEVENT" && strings.Contains(e.one(t, "UID"), uid) {
			if found != nil {
				t.Fatalf("two events %s", uid)
			}
			found = e
		}
	}
	if found == nil {
		t.Fatalf("no event %s", uid)
	}
	return found
}

func TestUpdateWithTheSamePlanKeepsEveryByte(t *testing.T) {
	first := written(t, plain(t, sails), usual)
	again, changes := updated(t, first, plain(t, sails), later())
	if !bytes.Equal(first, again) || len(changes) > 0 {
		t.Errorf("%q changed", changes)
	}
	// A minute's delay moves the DR by 0.1 NM and the twilights by a second.
	soon, changes := updated(t, first, plain(t, "2027-02-10T12:01:00Z"), later())
	if !bytes.Equal(first, soon) || len(changes) > 0 {
		t.Errorf("a minute's delay: %q changed", changes)
	}
}

// Half a day's delay, at some 75 NM behind, moves windows by minutes: each
// event keeps its UID, counts on and says when. Once more, nothing changes.
func TestUpdateOfALateShip(t *testing.T) {
	first := written(t, plain(t, sails), usual)
	late := plain(t, "2027-02-11T00:00:00Z")
	second, changes := updated(t, first, late, later())
	if len(changes) < 5 || !strings.HasPrefix(changes[0], "lost 10T18:41") {
		t.Errorf("changes %q", changes)
	}
	gone := eventOf(t, second, "2027-02-10-evening-stars-")
	if gone.one(t, "STATUS") != "CANCELLED" || gone.one(t, "SEQUENCE") != "1" || gone.one(t, "LAST-MODIFIED") != "20261202T083000Z" || len(gone.parts) > 0 {
		t.Errorf("the window lost: %+v", gone)
	}
	moved := eventOf(t, second, "2027-02-12-evening-stars-")
	if moved.one(t, "SEQUENCE") != "1" || moved.one(t, "LAST-MODIFIED") != "20261202T083000Z" || moved.one(t, "DTSTAMP") != "20261202T083000Z" || len(moved.all("STATUS")) > 0 || len(moved.parts) != 1 {
		t.Errorf("the window moved: %+v", moved)
	}
	for _, w := range late.Windows() {
		if e := eventOf(t, second, w.ID+"-"); e.one(t, "DTSTART") != whole(w.Begin).Format(stateTime) && w.Begin.Sub(timeFrom(t, e.one(t, "DTSTART"))).Abs() >= time.Minute {
			t.Errorf("%s begins %s, want %v", w.ID, e.one(t, "DTSTART"), w.Begin)
		}
	}
	third, changes := updated(t, second, late, later())
	if !bytes.Equal(second, third) || len(changes) > 0 {
		t.Errorf("once more: %q changed", changes)
	}
	back, changes := updated(t, third, plain(t, sails), later())
	if e := eventOf(t, back, "2027-02-10-evening-stars-"); len(e.all("STATUS")) > 0 || e.one(t, "SEQUENCE") != "2" || len(e.parts) != 1 {
		t.Errorf("the window that is back: %+v; changes %q", e, changes)
	}
}

func timeFrom(t testing.TB, text string) time.Time {
	t.Helper()
	at, err := time.Parse(stateTime, text)
	if err != nil {
		t.Fatal(err)
	}
	return at
}

// What is over is left alone: here the first two days, and a window of them
// that the new plan has not.
func TestUpdateLeavesThePast(t *testing.T) {
	first := written(t, plain(t, sails), usual)
	opt := usual
	opt.Stamp = timeFrom(t, "20270212T120000Z")
	second, changes := updated(t, first, plain(t, "2027-02-11T06:00:00Z"), opt)
	for _, c := range changes {
		if strings.Contains(c, " 10T") || strings.Contains(c, " 11T") {
			t.Errorf("the past has changed: %s", c)
		}
	}
	if len(changes) == 0 {
		t.Error("nothing to come has changed")
	}
	for _, day := range []string{"2027-02-10-evening", "2027-02-11-morning", "2027-02-11-evening"} {
		if a, b := eventOf(t, first, day), eventOf(t, second, day); fmt.Sprint(a.lines) != fmt.Sprint(b.lines) || len(a.parts) != len(b.parts) {
			t.Errorf("%s has changed", day)
		}
	}
}

// What a thing less than a person notices is: 59 s, 4.9' in a preset; more is
// noticed.
func TestWhatIsNoticed(t *testing.T) {
	for _, c := range []struct {
		name   string
		change func(*plan.Window)
		want   bool
	}{
		{"59 s", func(w *plan.Window) { w.Begin, w.End = w.Begin.Add(59*time.Second), w.End.Add(59*time.Second) }, false},
		{"a minute", func(w *plan.Window) { w.End = w.End.Add(time.Minute) }, true},
		{"a preset by 4.9'", func(w *plan.Window) { w.Round[0].Preset += unit.AngleFromMin(4.9) }, false},
		{"a preset by 5.1'", func(w *plan.Window) { w.Round[0].Preset += unit.AngleFromMin(5.1) }, true},
		{"a body in the best triad", func(w *plan.Window) { w.Triads[0] = w.Triads[1] }, true},
		{"a body less in the round", func(w *plan.Window) { w.Round = w.Round[1:] }, true},
		{"the order of the round", func(w *plan.Window) { w.Round[0], w.Round[1] = w.Round[1], w.Round[0] }, true},
		{"the round half a minute later", func(w *plan.Window) { w.Round[0].Time = w.Round[0].Time.Add(30 * time.Second) }, false},
		{"the round a minute later", func(w *plan.Window) { w.Round[0].Time = w.Round[0].Time.Add(time.Minute) }, true},
		{"a warning", func(w *plan.Window) { w.Warnings = append(w.Warnings, "a cloud has been seen") }, true},
	} {
		first := written(t, plain(t, sails), usual)
		p, w := plain(t, sails), (*plan.Window)(nil)
		for i := range p.Days {
			if len(p.Days[i].Windows) > 0 {
				w = &p.Days[i].Windows[0]
				break
			}
		}
		c.change(w)
		for i := range p.Days {
			for j := range p.Days[i].Programme {
				if item := &p.Days[i].Programme[j]; item.Window == w {
					item.Sights = w.Round
				}
			}
		}
		_, changes := updated(t, first, p, later())
		if (len(changes) > 0) != c.want {
			t.Errorf("%s: changes %q, want some: %v", c.name, changes, c.want)
		}
	}
}

// What the user and his program added stays: alarms, properties, notes in the
// text, a title; and components that are none of ours, byte for byte.
func TestUpdateKeepsWhatTheUserAdded(t *testing.T) {
	first := string(written(t, plain(t, sails), usual))
	foreign := "BEGIN:VTIMEZONE\r\nTZID:Ship's;odd\\,one\r\nX-FOLDED:abc\r\n def\r\nBEGIN:STANDARD\r\nDTSTART:19700101T000000\r\nTZOFFSETFROM:+0000\r\nTZOFFSETTO:+0000\r\nEND:STANDARD\r\nEND:VTIMEZONE\r\n"
	edited := strings.Replace(first, "BEGIN:VEVENT\r\n", foreign+"BEGIN:VEVENT\r\n", 1)
	i := strings.Index(edited, "2027-02-12-evening-stars")
	event := edited[i:]
	event = strings.Replace(event, "TRIGGER:-PT20M", "TRIGGER:-PT45M", 1)
	event = strings.Replace(event, "TRANSP:TRANSPARENT\r\n", "TRANSP:TRANSPARENT\r\nCOMMENT:my own\r\nATTENDEE;CN=\"A, B\":mailto:mate@example.org\r\n", 1)
	event = strings.Replace(event, "DESCRIPTION:", "DESCRIPTION:Ask the mate for the good sextant\\, please.\\n", 1)
	edited = edited[:i] + event
	second, _ := updated(t, []byte(edited), plain(t, "2027-02-11T00:00:00Z"), later())
	if !bytes.Contains(second, []byte(foreign)) {
		t.Error("a foreign component has changed")
	}
	e := eventOf(t, second, "2027-02-12-evening-stars-")
	if e.one(t, "COMMENT") != "my own" || len(e.all("ATTENDEE")) != 1 || e.parts[0].one(t, "TRIGGER") != "-PT45M" {
		t.Errorf("additions lost: %+v", e)
	}
	text := unescape(e.one(t, "DESCRIPTION"))
	if _, notes, found := strings.Cut(text, "\n\nNoted before:\n"); !found || notes != "Ask the mate for the good sextant, please." {
		t.Errorf("notes %q in %q", notes, text)
	}
	// The same alarm removed stays so; other events have theirs.
	third, _ := updated(t, second, plain(t, sails), later())
	if text := unescape(eventOf(t, third, "2027-02-12-evening-stars-").one(t, "DESCRIPTION")); strings.Count(text, "good sextant") != 1 {
		t.Errorf("the note after a second update: %q", text)
	}
}

// A program that drops properties it does not know leaves times and title to
// go by.
func TestUpdateWithoutState(t *testing.T) {
	var kept []string
	for _, l := range strings.SplitAfter(string(written(t, plain(t, sails), usual)), "\r\n") {
		if strings.HasPrefix(l, "X-GLOAM") || strings.HasPrefix(l, " ") && len(kept) > 0 && strings.HasPrefix(kept[len(kept)-1], "X-GLOAM") {
			continue
		}
		kept = append(kept, l)
	}
	old := strings.Join(kept, "")
	if same, changes := updated(t, []byte(old), plain(t, sails), later()); string(same) != old || len(changes) > 0 {
		t.Errorf("the same plan: %q changed", changes)
	}
	if _, changes := updated(t, []byte(old), plain(t, "2027-02-11T00:00:00Z"), later()); len(changes) < 5 {
		t.Errorf("a late ship: changes %q", changes)
	}
}

func TestUpdateRefuses(t *testing.T) {
	good := string(written(t, plain(t, sails), usual))
	begin := strings.Index(good, "BEGIN:VEVENT")
	end := strings.Index(good, "END:VEVENT") + len("END:VEVENT\r\n")
	for _, c := range []struct{ name, in, want string }{
		{"nothing", "", "0 components"},
		{"words", "hello\n", "NAME:VALUE"},
		{"GeoJSON", `{"type":"LineString"}`, "outside a calendar"},
		{"cut short", good[:len(good)-200], "cut short"},
		{"an end without beginning", "BEGIN:VCALENDAR\r\nEND:VEVENT\r\n", "END:VEVENT without its BEGIN"},
		{"two calendars", good + good, "2 components"},
		{"a vcard", "BEGIN:VCARD\r\nEND:VCARD\r\n", "one VCALENDAR"},
		{"an event twice", good[:begin] + good[begin:end] + good[begin:], "two events have the UID 2027-02-10-evening-stars"},
		{"another voyage", string(written(t, voyage(t, "Another", "", sails), usual)), "another voyage's calendar"},
		{"another program's", "BEGIN:VCALENDAR\r\nVERSION:2.0\r\nPRODID:-//x\r\nBEGIN:VEVENT\r\nUID:a@b\r\nEND:VEVENT\r\nEND:VCALENDAR\r\n", "no event of gloam"},
		{"deep", strings.Repeat("BEGIN:VCALENDAR\r\n", 9), "nested deeper than 8"},
		{"not UTF-8", strings.Replace(good, "SUMMARY:", "SUMMARY:\xff", 1), "not UTF-8"},
		{"a control character", strings.Replace(good, "SUMMARY:", "SUMMARY:\x00", 1), "control character"},
		{"huge", good + strings.Repeat(" ", maxCalendarBytes), "over 16 MB"},
	} {
		var b bytes.Buffer
		_, err := Update(&b, strings.NewReader(c.in), plain(t, sails), later())
		if err == nil || !strings.Contains(err.Error(), c.want) || b.Len() > 0 {
			t.Errorf("%s: error %v, want %q; %d bytes written", c.name, err, c.want, b.Len())
		}
	}
}

// Other line ends are taken, and become CRLF.
func TestUpdateTakesOtherLineEnds(t *testing.T) {
	good := written(t, plain(t, sails), usual)
	got, changes := updated(t, bytes.ReplaceAll(good, []byte("\r\n"), []byte("\n")), plain(t, sails), later())
	if !bytes.Equal(got, good) || len(changes) > 0 {
		t.Errorf("changes %q", changes)
	}
}

// Whatever is read, an update gives a calendar that can be read and updated
// again without a change, or an error and nothing.
func FuzzUpdate(f *testing.F) {
	p := plain(f, sails)
	p.Days = p.Days[:1]
	var short []string // long seeds stall the fuzzer
	for _, l := range strings.SplitAfter(string(written(f, p, usual)), "\r\n") {
		if !strings.HasPrefix(l, " ") && !strings.HasPrefix(l, "DESCRIPTION") {
			short = append(short, l)
		}
	}
	good := strings.Join(short, "")
	f.Add([]byte(good))
	f.Add([]byte(strings.ReplaceAll(good, "20270210", "20270211")))
	f.Add([]byte("BEGIN:VCALENDAR\r\nEND:VCALENDAR\r\n"))
	f.Fuzz(func(t *testing.T, data []byte) {
		var b, c bytes.Buffer
		if _, err := Update(&b, bytes.NewReader(data), p, later()); err != nil {
			if b.Len() > 0 {
				t.Error("bytes came with the error")
			}
			return
		}
		changes, err := Update(&c, bytes.NewReader(b.Bytes()), p, later())
		if err != nil {
			t.Fatalf("what was written is refused: %v", err)
		}
		if len(changes) > 0 || !bytes.Equal(b.Bytes(), c.Bytes()) {
			t.Errorf("updated again it changes: %v", changes)
		}
	})
}

// What a person has decided holds: an event he cancelled stays cancelled, the
// alarm he added to one that is cancelled and comes back is there again, and so
// is gloam's.
func TestUpdateLeavesDecisions(t *testing.T) {
	first := string(written(t, plain(t, sails), usual))
	i := strings.Index(first, "UID:2027-02-10-evening-stars")
	struck := first[:i] + "STATUS:CANCELLED\r\n" + first[i:]
	if same, changes := updated(t, []byte(struck), plain(t, sails), later()); string(same) != struck || len(changes) > 0 {
		t.Errorf("an event cancelled by hand: %q changed", changes)
	}
	mine := "BEGIN:VALARM\r\nACTION:AUDIO\r\nTRIGGER:-PT5M\r\nEND:VALARM\r\n"
	j := i + strings.Index(first[i:], "BEGIN:VALARM")
	gone, _ := updated(t, []byte(first[:j]+mine+first[j:]), plain(t, "2027-02-11T00:00:00Z"), later())
	if e := eventOf(t, gone, "2027-02-10-evening-stars-"); len(e.parts) != 1 || e.parts[0].one(t, "ACTION") != "AUDIO" {
		t.Errorf("cancelled: %d alarms, want the one added by hand", len(e.parts))
	}
	back, _ := updated(t, gone, plain(t, sails), later())
	if e := eventOf(t, back, "2027-02-10-evening-stars-"); len(e.parts) != 2 || len(e.all("X-GLOAM-CANCELLED")) > 0 {
		t.Errorf("back: %d alarms, want two", len(e.parts))
	}
}

// Without a choice the kinds that the calendar has are kept up.
func TestUpdateKeepsTheKinds(t *testing.T) {
	opt := usual
	opt.Include = []plan.ItemKind{plan.Stars, plan.Daily, plan.Noon, plan.SunLines}
	first := written(t, plain(t, sails), opt)
	opt = later()
	if same, changes := updated(t, first, plain(t, sails), opt); !bytes.Equal(first, same) || len(changes) > 0 {
		t.Errorf("%q changed", changes)
	}
	opt.Include = []plan.ItemKind{plan.Stars}
	if _, changes := updated(t, first, plain(t, sails), opt); len(changes) < 5 {
		t.Errorf("with stars alone: %q", changes)
	}
}

// The times of a whole day's event stand in its text alone, and are kept true.
func TestUpdateOfDailyTimes(t *testing.T) {
	opt := usual
	opt.Include = []plan.ItemKind{plan.Daily}
	first := written(t, plain(t, sails), opt)
	late := plain(t, "2027-02-10T20:00:00Z")
	opt.Stamp = later().Stamp
	second, changes := updated(t, first, late, opt)
	if len(changes) < 3 {
		t.Errorf("changes %q, want some of every day", changes)
	}
	for _, e := range late.Events() {
		if e.Kind != plan.Sunset {
			continue
		}
		at := plan.Minute(e.Time, late.Clock.At)
		day := eventOf(t, second, late.Clock.Day(e.Time).Date.Format(time.DateOnly)+"-daily-")
		if text := unescape(day.one(t, "DESCRIPTION")); !strings.Contains(text, at.Format("15:04")+" UTC sunset") {
			t.Errorf("sunset at %s is not in %q", at.Format("15:04"), text)
		}
	}
}

// Counters and titles out of bounds do no harm (RFC 5545, 3.3.8: integers of 32
// bits with sign).
func TestUpdateOfOddValues(t *testing.T) {
	first := string(written(t, plain(t, sails), usual))
	for sequence, want := range map[string]string{"2147483647": "2147483647", "-5": "1", "many": "1", "7": "8"} {
		old := strings.ReplaceAll(first, "SEQUENCE:0", "SEQUENCE:"+sequence)
		second, _ := updated(t, []byte(old), plain(t, "2027-02-11T00:00:00Z"), later())
		if got := eventOf(t, second, "2027-02-12-evening-stars-").one(t, "SEQUENCE"); got != want {
			t.Errorf("SEQUENCE %s becomes %s, want %s", sequence, got, want)
		}
	}
	var b bytes.Buffer
	changes, err := Update(&b, strings.NewReader(strings.ReplaceAll(first, "SUMMARY:", "SUMMARY:\x1b[31m")), plain(t, "2027-02-11T00:00:00Z"), later())
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range changes {
		if strings.Contains(c.Title, "\x1b") {
			t.Errorf("a title with a terminal code: %q", c.Title)
		}
	}
	if _, err := Update(&b, strings.NewReader("BEGIN:VCALENDAR\r\n"+strings.Repeat("A:\r\n", maxLines+1)+"END:VCALENDAR\r\n"), plain(t, sails), later()); err == nil || !strings.Contains(err.Error(), "lines") {
		t.Errorf("a calendar of too many lines: %v", err)
	}
}
