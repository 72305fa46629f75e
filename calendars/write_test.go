package calendars

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"
	"time"

	"gloam/plan"
	"gloam/track"
)

// allowed are the properties this package writes, and no others.
var allowed = map[string]string{
	"VCALENDAR": "VERSION PRODID CALSCALE X-WR-CALNAME NAME COLOR REFRESH-INTERVAL",
	"VEVENT":    "UID DTSTAMP DTSTART DTEND SEQUENCE SUMMARY DESCRIPTION LOCATION GEO CATEGORIES TRANSP X-GLOAM-STATE X-GLOAM-TEXT",
	"VALARM":    "ACTION TRIGGER DESCRIPTION X-GLOAM-ALARM",
}

// wellFormed checks what RFC 5545 asks of each component: section 3.6 for the
// calendar, 3.6.1 for events, 3.6.6 for alarms, 3.8.4.7 for UIDs.
func wellFormed(cal *component, events int) error {
	uids := map[string]bool{}
	check := func(c *component) error {
		for _, p := range c.lines {
			if !strings.Contains(" "+allowed[c.kind]+" ", " "+p.name+" ") || p.params != "" && p.name+";"+p.params != "REFRESH-INTERVAL;VALUE=DURATION" {
				return fmt.Errorf("%s has %s;%s:%s", c.kind, p.name, p.params, p.value)
			}
		}
		for _, name := range strings.Fields(allowed[c.kind]) {
			if n := len(c.all(name)); n != 1 && (name != "CATEGORIES" || n != 2) {
				return fmt.Errorf("%s has %d of %s", c.kind, n, name)
			}
		}
		return nil
	}
	if err := check(cal); err != nil {
		return err
	}
	if len(cal.parts) != events {
		return fmt.Errorf("%d events, want %d", len(cal.parts), events)
	}
	for _, e := range cal.parts {
		if err := check(e); err != nil {
			return err
		}
		uid := e.all("UID")[0]
		if uids[uid] || e.all("DTSTART")[0] >= e.all("DTEND")[0] {
			return fmt.Errorf("%s: UID twice, or it ends before it begins", uid)
		}
		uids[uid] = true
		for _, a := range e.parts {
			if err := check(a); err != nil {
				return err
			}
		}
	}
	return nil
}

func TestEventsFollowThePlan(t *testing.T) {
	p := voyage(t, "Yawl Sorrel, Cascais to Funchal", "Cascais", "2027-02-10T12:00:00Z")
	cal := parsed(t, p, usual)
	windows := p.Windows()
	if err := wellFormed(cal, len(windows)); err != nil {
		t.Fatal(err)
	}
	if len(windows) < 4 {
		t.Fatalf("%d windows, want some", len(windows))
	}
	for i, e := range cal.parts {
		w := windows[i]
		for name, want := range map[string]string{
			"DTSTAMP": "20261201T083000Z",
			"DTSTART": w.Begin.Round(time.Second).Format("20060102T150405Z"),
			"DTEND":   w.End.Round(time.Second).Format("20060102T150405Z"),
		} {
			if got := e.one(t, name); got != want {
				t.Errorf("%s: %s is %s, want %s", w.ID, name, got, want)
			}
		}
		if got := unescape(e.one(t, "SUMMARY")); !strings.HasSuffix(got, ": "+w.Triads[0].Names()) {
			t.Errorf("%s: summary %q lacks the best triad", w.ID, got)
		}
		var lat, lon float64
		if _, err := fmt.Sscanf(e.one(t, "GEO"), "%f;%f", &lat, &lon); err != nil ||
			math.Abs(lat-w.Fix.Lat.Deg()) > 1e-6 || math.Abs(lon-w.Fix.Lon.Deg()) > 1e-6 { // its last figure
			t.Errorf("%s: GEO %s", w.ID, e.one(t, "GEO"))
		}
		description := unescape(e.one(t, "DESCRIPTION"))
		for _, c := range w.Bodies {
			if w.Listed(c.Body) != strings.Contains(description, "\n"+c.Label()+" ") {
				t.Errorf("%s: %v listed %v, but not so in the description", w.ID, c.Body, w.Listed(c.Body))
			}
		}
		for _, c := range plan.Cautions {
			if !strings.Contains(description, c) {
				t.Errorf("%s: no caution %q", w.ID, c)
			}
		}
		if got := e.parts[0].one(t, "TRIGGER"); got != "-PT20M" {
			t.Errorf("%s: trigger %s, want -PT20M", w.ID, got)
		}
	}
}

func TestAlarms(t *testing.T) {
	p := voyage(t, "Yawl Sorrel", "", "2027-02-10T12:00:00Z")
	for _, c := range []struct {
		alarms []time.Duration
		want   string
	}{{nil, ""}, {[]time.Duration{90 * time.Second}, "-PT90S"}, {[]time.Duration{2 * time.Hour, 20 * time.Minute}, "-PT120M -PT20M"}} {
		var got []string
		for _, a := range parsed(t, p, Options{Alarms: c.alarms, Stamp: stamp}).parts[0].parts {
			got = append(got, a.one(t, "TRIGGER"))
		}
		if strings.Join(got, " ") != c.want {
			t.Errorf("alarms %v: %q, want %q", c.alarms, got, c.want)
		}
	}
	if err := Write(&bytes.Buffer{}, p, Options{Alarms: []time.Duration{-time.Minute}}); err == nil {
		t.Error("an alarm after the beginning was taken")
	}
}

func TestSameInputSameBytes(t *testing.T) {
	one := written(t, voyage(t, "Yawl Sorrel", "", "2027-02-10T12:00:00Z"), usual)
	two := written(t, voyage(t, "Yawl Sorrel", "", "2027-02-10T12:00:00Z"), usual)
	if !bytes.Equal(one, two) {
		t.Error("two writings differ")
	}
}

// A voyage that sails some hours later keeps the UIDs of its windows; another
// voyage has others.
func TestUIDs(t *testing.T) {
	uids := func(p *plan.Plan) map[string]bool {
		all := map[string]bool{}
		for _, e := range parsed(t, p, usual).parts {
			all[e.one(t, "UID")] = true
		}
		return all
	}
	for _, name := range []string{"Yawl Sorrel", ""} {
		before := uids(voyage(t, name, "", "2027-02-10T12:00:00Z"))
		for uid := range uids(voyage(t, name, "", "2027-02-10T16:00:00Z")) {
			if !before[uid] {
				t.Errorf("%q: %s is new after a delay", name, uid)
			}
		}
		for uid := range uids(voyage(t, "Another", "", "2027-02-10T12:00:00Z")) {
			if before[uid] {
				t.Errorf("%q: %s is also another voyage's", name, uid)
			}
		}
	}
}

// hostile are names made to break a calendar or to smuggle something in.
var hostile = []string{
	`Commas, semicolons; "quotes" and \ backslashes \n`,
	"two\nlines", "old\rmac", "dos\r\nATTENDEE:mailto:x@example.org", "\r\nEND:VEVENT\r\nBEGIN:VTODO",
	"nul\x00bell\x07escape\x1b[31m del\x7f", "bad\xff\xfeutf8" + strings.Repeat("夕", 60),
	strings.Repeat("long ", 500), "\u2028sep\u2029arators\u0085", "👩\u200d🚀" + strings.Repeat("é́", 90), "   ", "\t",
}

func TestHostileNames(t *testing.T) {
	for _, name := range hostile {
		p := voyage(t, name, name, "2027-02-10T12:00:00Z")
		cal, err := parse(written(t, p, usual))
		if err == nil {
			err = wellFormed(cal, len(p.Windows()))
		}
		if err != nil {
			t.Errorf("%q: %v", name, err)
		}
	}
}

func FuzzNames(f *testing.F) {
	for _, name := range hostile {
		f.Add(name, name)
	}
	base := voyage(f, "", "", "2027-02-10T12:00:00Z")
	base.Days = base.Days[:2]
	f.Fuzz(func(t *testing.T, name, waypoint string) {
		p := *base
		passage := *base.Passage
		passage.Name = name
		passage.Legs = append([]track.Leg(nil), passage.Legs...)
		passage.Legs[0].From.Name, passage.Legs[0].To.Name = waypoint, waypoint
		p.Passage = &passage
		cal, err := parse(written(t, &p, usual))
		if err == nil {
			err = wellFormed(cal, len(p.Windows()))
		}
		if err != nil {
			t.Errorf("%q, %q: %v", name, waypoint, err)
		}
	})
}

// A calendar must hold a component (RFC 5545, 3.6): a voyage in polar day gets
// one event that lasts as long and says why there is no window.
func TestVoyageWithoutWindow(t *testing.T) {
	r := &track.Route{Name: "Polar day", Waypoints: []track.Waypoint{
		{Position: track.PositionFromDeg(78, 10)}, {Position: track.PositionFromDeg(79, 8)},
	}}
	passage, err := r.Sail(track.Orders{Departure: time.Date(2027, 6, 20, 6, 0, 0, 0, time.UTC), SpeedKn: 5})
	if err != nil {
		t.Fatal(err)
	}
	p, err := plan.New(passage, plan.DefaultSettings())
	if err != nil {
		t.Fatal(err)
	}
	cal := parsed(t, p, usual)
	if len(cal.parts) != 1 {
		t.Fatalf("%d events, want 1", len(cal.parts))
	}
	e := cal.parts[0]
	if got := e.one(t, "DTSTART"); got != "20270620T060000Z" {
		t.Errorf("it begins %s, not with the voyage", got)
	}
	if got := unescape(e.one(t, "DESCRIPTION")); !strings.Contains(got, "20 June: the Sun does not sink to -6°") {
		t.Errorf("it does not say why: %q", got)
	}
	for _, command := range [][]string{pythonParser(), nodeParser()} {
		if command != nil && len(read(t, command, written(t, p, usual))) != 1 {
			t.Errorf("%s does not find the one event", command[0])
		}
	}
}

type failing struct{}

func (failing) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestWriteTellsOfErrors(t *testing.T) {
	if Write(failing{}, voyage(t, "Yawl Sorrel", "", "2027-02-10T12:00:00Z"), usual) == nil {
		t.Error("a failing writer went unnoticed")
	}
}
