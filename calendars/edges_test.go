package calendars

import (
	"fmt"
	"slices"
	"strings"
	"testing"
	"time"
	"unicode"
	"unicode/utf8"

	"pgregory.net/rapid"

	"gloam/astro"
	"gloam/plan"
)

// sorrel is a plan of which a test may change the first window.
func sorrel(t *testing.T) (*plan.Plan, *plan.Window) {
	t.Helper()
	p := voyage(t, "Yawl Sorrel", "Cascais", "2027-02-10T12:00:00Z")
	for i := range p.Days {
		if len(p.Days[i].Windows) > 0 {
			return p, &p.Days[i].Windows[0]
		}
	}
	t.Fatal("no window")
	return nil, nil
}

// RFC 5545, 3.8.2.2: DTEND is later than DTSTART. Times are rounded to whole
// seconds, with carries, and an event lasts one at least.
func TestTimesAreWholeSeconds(t *testing.T) {
	base := time.Date(2027, 2, 10, 18, 59, 59, 0, time.UTC)
	for _, c := range []struct {
		begin, lasts time.Duration // begin after base
		start, end   string
	}{
		{0, time.Hour, "20270210T185959Z", "20270210T195959Z"},
		{600 * time.Millisecond, time.Hour, "20270210T190000Z", "20270210T200000Z"},
		{100 * time.Millisecond, 300 * time.Millisecond, "20270210T185959Z", "20270210T190000Z"},
		{0, 0, "20270210T185959Z", "20270210T190000Z"},
	} {
		p, w := sorrel(t)
		w.Begin = base.Add(c.begin).In(time.FixedZone("", -7200))
		w.End = w.Begin.Add(c.lasts)
		e := parsed(t, p, usual).parts[0]
		if start, end := e.one(t, "DTSTART"), e.one(t, "DTEND"); start != c.start || end != c.end {
			t.Errorf("%v for %v: %s to %s, want %s to %s", c.begin, c.lasts, start, end, c.start, c.end)
		}
	}
}

// RFC 5545, 3.8.7.2: DTSTAMP is in UTC, whatever the zone of the stamp given.
func TestStampIsUTC(t *testing.T) {
	p, _ := sorrel(t)
	opt := Options{Stamp: stamp.In(time.FixedZone("", 5*3600))}
	if got := parsed(t, p, opt).parts[0].one(t, "DTSTAMP"); got != "20261201T083000Z" {
		t.Errorf("DTSTAMP %s, want 20261201T083000Z", got)
	}
}

// A UID stays the same from release to release, or calendars read twice would
// hold everything twice. The hash is coreutils' sha256sum of the name.
func TestUIDIsPinned(t *testing.T) {
	p, _ := sorrel(t)
	const want = "2027-02-10-evening-stars-99ad9f98bc53@gloam"
	if got := parsed(t, p, usual).parts[0].one(t, "UID"); got != want {
		t.Errorf("UID %s, want %s", got, want)
	}
}

// Without a triad the title says what there is.
func TestSummaryOfFewBodies(t *testing.T) {
	for n, want := range []string{"nothing to shoot", "one body only", "two bodies only"} {
		p, w := sorrel(t)
		w.Bodies, w.Triads, w.Round = w.Bodies[:n], nil, nil
		e := parsed(t, p, usual).parts[0]
		if got := unescape(e.one(t, "SUMMARY")); !strings.HasPrefix(got, "Evening stars: "+want) {
			t.Errorf("%d bodies: summary %q, want %q in it", n, got, want)
		}
		text := unescape(e.one(t, "DESCRIPTION"))
		if !strings.Contains(text, "\n"+plan.Capital(want)) {
			t.Errorf("%d bodies: no %q in\n%s", n, want, text)
		}
		for _, c := range w.Bodies {
			if !strings.Contains(text, "\n"+c.Label()+" ") {
				t.Errorf("%d bodies: %v is missing from\n%s", n, c.Body, text)
			}
		}
	}
}

// The Moon is named with the limb to bring to the horizon.
func TestMoonHasLimb(t *testing.T) {
	for limb, want := range map[astro.Limb]string{astro.Lower: "\nMoon lower limb ", astro.Upper: "\nMoon upper limb "} {
		p, w := sorrel(t)
		w.Triads, w.Bodies = nil, []plan.Candidate{{Body: astro.Moon, Limb: limb}}
		if text := unescape(parsed(t, p, usual).parts[0].one(t, "DESCRIPTION")); !strings.Contains(text, want) {
			t.Errorf("no %q in\n%s", want, text)
		}
	}
}

// The description gives the events within two hours of the window, no others,
// and the window's own times, by the ship's clock and in UTC.
func TestDescriptionTimes(t *testing.T) {
	p := voyage(t, "Yawl Sorrel", "Cascais", "2027-02-10T12:00:00Z")
	windows := p.Windows()
	for i, e := range parsed(t, p, usual).parts {
		w := windows[i]
		lines := strings.Split(unescape(e.one(t, "DESCRIPTION")), "\n")
		both := func(at time.Time) string {
			at = at.Round(time.Minute)
			return fmt.Sprintf("%s ship %s UTC", p.Clock.At(at).Format("15:04"), at.UTC().Format("15:04"))
		}
		want := []string{"Begin " + both(w.Begin), "Best  " + both(w.Best), "End   " + both(w.End)}
		for _, ev := range p.Events() {
			line := plan.Capital(ev.Kind.Words()) + " " + both(ev.Time)
			near := !ev.Time.Before(w.Begin.Add(-2*time.Hour)) && !ev.Time.After(w.End.Add(2*time.Hour))
			if near {
				want = append(want, line)
			} else if slices.Contains(lines, line) {
				t.Errorf("%s: %q is more than two hours away", w.ID, line)
			}
		}
		for _, line := range want {
			if !slices.Contains(lines, line) {
				t.Errorf("%s: no line %q", w.ID, line)
			}
		}
	}
}

// Text of the user's file goes into the calendar's name and nowhere else, where
// it needs no escape (RFC 5545, 3.3.11).
func TestNamesStayInTheCalendarName(t *testing.T) {
	const name, waypoint = `Quillfish; of, "Ness"\Bay`, "Wrackholm"
	p := voyage(t, name, waypoint, "2027-02-10T12:00:00Z")
	cal := parsed(t, p, usual)
	if got := cal.one(t, "X-WR-CALNAME"); got != `Quillfish of "Ness" Bay - sights` {
		t.Errorf("calendar's name %q", got)
	}
	if cal.one(t, "NAME") != cal.one(t, "X-WR-CALNAME") {
		t.Errorf("two names, %q and another", cal.one(t, "NAME"))
	}
	if data := string(written(t, p, usual)); strings.Count(data, "Quillfish") != 2 || strings.Contains(data, waypoint) {
		t.Error("names of the voyage stand outside the calendar's name")
	}
}

// RFC 5545, 3.1: lines of every length fold at 75 octets without splitting a
// character, and unfold to what they were. The strict reader checks the lines.
func TestFolding(t *testing.T) {
	p, _ := sorrel(t)
	p.Days = p.Days[:1]
	for _, letter := range []string{"a", "é", "夕", "👩", "e\u0301", "👩\u200d🚀"} {
		for n := 1; n <= 160; n++ {
			p.Passage.Name = strings.Repeat(letter, n)
			if got := parsed(t, p, usual).one(t, "X-WR-CALNAME"); got != p.Passage.Name+" - sights" {
				t.Fatalf("%d of %q came back as %q", n, letter, got)
			}
		}
	}
}

// Two hours are two hours, before the window and after it.
func TestEventsNearby(t *testing.T) {
	p, w := sorrel(t)
	for i := range p.Days {
		p.Days[i].Events = nil
	}
	p.Days[0].Events = []plan.Event{
		{Kind: plan.Moonset, Time: w.Begin.Add(-2*time.Hour - time.Minute)},
		{Kind: plan.Sunset, Time: w.Begin.Add(-2*time.Hour + time.Minute)},
		{Kind: plan.NauticalDusk, Time: w.End.Add(2*time.Hour - time.Minute)},
		{Kind: plan.Moonrise, Time: w.End.Add(2*time.Hour + time.Minute)},
	}
	text := unescape(parsed(t, p, usual).parts[0].one(t, "DESCRIPTION"))
	for word, want := range map[string]bool{"Moonset": false, "Sunset": true, "Nautical dusk": true, "Moonrise": false} {
		if strings.Contains(text, "\n"+word+" ") != want {
			t.Errorf("%s listed: %v, want %v", word, !want, want)
		}
	}
}

func TestClean(t *testing.T) {
	for in, want := range map[string]string{
		"":                         "",
		" \t both ends \r\n ":      "both ends",
		"a\r\nb\rc\nd":             "a\nb\nc\nd",
		"a\u0085b\u2028c\u2029d":   "a\nb\nc\nd",
		"a\x00\x07\x1b\x7f\u009bb": "ab",
		"tab\tkept":                "tab\tkept",
		"bad\xff\xfeend":           "bad\uFFFDend",
		`\, ; " stay`:              `\, ; " stay`,
	} {
		if got := clean(in); got != want {
			t.Errorf("%q became %q, want %q", in, got, want)
		}
	}
}

// Whatever comes in, clean leaves nothing that golang-ical would let through,
// and has nothing left to do.
func TestCleanHolds(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		in := string(rapid.SliceOf(rapid.Byte()).Draw(t, "bytes")) + rapid.String().Draw(t, "text")
		got := clean(in)
		bad := func(r rune) bool {
			return unicode.IsControl(r) && r != '\n' && r != '\t' || r == '\u2028' || r == '\u2029'
		}
		if !utf8.ValidString(got) || strings.IndexFunc(got, bad) >= 0 || strings.TrimSpace(got) != got || clean(got) != got {
			t.Fatalf("%q became %q", in, got)
		}
	})
}
