package track

import (
	"fmt"
	"strings"
	"testing"
	"time"
	_ "time/tzdata"
)

// clockText writes the days and the changes of each: "11-20 +00:00 (24h)
// [+1h at 02:00]".
func clockText(c *Clock) string {
	var all []string
	days := c.Days()
	for i, d := range days {
		s := d.Date.Format("01-02 ") + time.Unix(0, 0).In(time.FixedZone("", int(d.Offset.Seconds()))).Format("-07:00")
		if i+1 < len(days) {
			s += fmt.Sprintf(" %v", days[i+1].Begin.Sub(d.Begin).Hours())
		}
		for _, x := range c.Changes(d) {
			s += fmt.Sprintf(" [%v %+d %s]", x.Clock, x.Dates, x.At.Add(x.From).Format("15:04"))
		}
		all = append(all, s)
	}
	return strings.Join(all, "; ")
}

// Rules of the tz database (memory): the European Union changes at 01:00 UTC on
// the last Sundays of March and October; the Chatham Islands keep +12:45 and
// +13:45 and change at 02:45 standard time on the last Sunday of September;
// Lord Howe Island puts its clock forward half an hour at 02:00 on the first
// Sunday of October; Samoa skipped 30 December 2011, Kwajalein 21 August 1993
// (by the names' dates); India keeps +05:30.
func TestZoneTime(t *testing.T) {
	for _, c := range []struct {
		zone, departure string
		days            float64
		want            string
	}{
		{"Europe/Lisbon", "2026-10-24T12:00:00Z", 1.5, "10-24 +01:00 24; 10-25 +01:00 25 [-1h0m0s +0 02:00]; 10-26 +00:00"},
		{"Europe/Lisbon", "2026-03-28T12:00:00Z", 1.5, "03-28 +00:00 24; 03-29 +00:00 23 [1h0m0s +0 01:00]; 03-30 +01:00"},
		{"Pacific/Chatham", "2026-09-26T00:00:00Z", 1, "09-26 +12:45 24; 09-27 +12:45 [1h0m0s +0 02:45]"},
		{"Australia/Lord_Howe", "2026-10-03T00:00:00Z", 1, "10-03 +10:30 24; 10-04 +10:30 [30m0s +0 02:00]"},
		{"Pacific/Apia", "2011-12-29T12:00:00Z", 2, "12-29 -10:00 24; 12-31 +14:00 24 [0s +1 00:00]; 01-01 +14:00"},
		{"Asia/Kolkata", "2026-01-01T12:00:00Z", 1, "01-01 +05:30 24; 01-02 +05:30"},
	} {
		loc, err := time.LoadLocation(c.zone)
		if err != nil {
			t.Fatal(err)
		}
		at, err := time.Parse(time.RFC3339, c.departure)
		if err != nil {
			t.Fatal(err)
		}
		p := sail(t, at, 5/c.days, Rhumb, 0, 0, 0, 120/degreeNM)
		clock := NewClock(p, ZoneTime(loc))
		if got := clockText(clock); got != c.want {
			t.Errorf("%s: %s\nwant %s", c.zone, got, c.want)
		}
		for at := p.Departure; at.Before(p.Arrival); at = at.Add(7 * time.Minute) {
			if got, want := clock.At(at).Format(time.DateTime), at.In(loc).Format(time.DateTime); got != want {
				t.Fatalf("%s: the clock shows %s, want %s", c.zone, got, want)
			}
		}
		if fault := clockFault(p, clock); fault != "" {
			t.Errorf("%s: %s", c.zone, fault)
		}
	}
}

func TestListedTime(t *testing.T) {
	p := sail(t, at(20, 12, 0), 12, Rhumb, 0, -16, 0, -36) // zone -1; four days
	for _, c := range []struct{ list, want string }{
		{"2026-11-21=-02:00,2026-11-23=-03:30", "11-20 -01:00 25; 11-21 -02:00 24 [-1h0m0s +0 00:00]; 11-22 -02:00 25.5; 11-23 -03:30 24 [-1h30m0s +0 00:00]; 11-24 -03:30"},
		{"2026-11-22=+0", "11-20 -01:00 24; 11-21 -01:00 24; 11-22 +00:00 23 [1h0m0s +0 00:00]; 11-23 +00:00 24; 11-24 +00:00"},
		{"2026-11-01=+05:30", "11-20 +05:30 24; 11-21 +05:30 24; 11-22 +05:30 24; 11-23 +05:30 24; 11-24 +05:30"},
		{"2027-01-01=+05:30", "11-20 -01:00 24; 11-21 -01:00 24; 11-22 -01:00 24; 11-23 -01:00 24; 11-24 -01:00"},
		// The date line by list: 11-22 lived again, then skipped.
		{"2026-11-21=+12:00,2026-11-23=-12:00", "11-20 -01:00 24; 11-21 +12:00 11 [13h0m0s +0 00:00]; 11-22 +12:00 24; 11-22 -12:00 24 [0s -1 00:00]; 11-23 -12:00 24; 11-24 -12:00"},
	} {
		rule, err := ParseShipTime(c.list)
		if err != nil {
			t.Fatal(err)
		}
		clock := NewClock(p, rule)
		if got := clockText(clock); got != c.want {
			t.Errorf("%s: %s\nwant %s", c.list, got, c.want)
		}
	}
}

func TestParseShipTime(t *testing.T) {
	p := sail(t, at(20, 12, 0), 12, Rhumb, 0, -50, 0, -51)
	for text, want := range map[string]string{
		"auto": "-03:00", "utc": "+00:00", "UTC": "+00:00", "-3": "-03:00", "+05:30": "+05:30", "UTC-3": "-03:00", "+0530": "+05:30", "-14": "-14:00",
		"Asia/Kathmandu": "+05:45", " Atlantic/Azores ": "-01:00",
	} {
		rule, err := ParseShipTime(text)
		if err != nil {
			t.Errorf("%q: %v", text, err)
			continue
		}
		if got := NewClock(p, rule).At(at(20, 13, 0)).Format("-07:00"); got != want {
			t.Errorf("%q: %s, want %s", text, got, want)
		}
	}
	for text, want := range map[string]string{
		"": "auto, utc", "Local": "auto, utc", "Nowhere/Else": "zone name", "+15": "auto, utc", "+5:60": "auto, utc", "../../etc/passwd": "auto, utc", "3": "auto, utc",
		"2026-11-24=": `offset ""`, "2026-13-01=+1": `date "2026-13-01"`, "2026-11-24=+1,2026-11-24=+2": "dates in order",
		"2026-11-24=+1,2026-11-23=+2": "dates in order", "2026-11-24=+15:00": "at most 14 hours", "=": `date ""`,
	} {
		if _, err := ParseShipTime(text); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: error %v, want one with %q", text, err, want)
		}
	}
}

func FuzzParseShipTime(f *testing.F) {
	for _, s := range []string{"auto", "utc", "-03:00", "2026-11-24=-02:00,2026-11-28=-03:00", "Europe/Lisbon", "9999-12-31=+1", "0001-01-01=-14"} {
		f.Add(s)
	}
	p, err := route(0, -50, 0, -51).Sail(Orders{Departure: noon, SpeedKn: 5})
	if err != nil {
		f.Fatal(err)
	}
	f.Fuzz(func(t *testing.T, text string) {
		rule, err := ParseShipTime(text)
		if err != nil {
			return
		}
		c := NewClock(p, rule)
		if days := c.Days(); len(days) == 0 || days[0].Begin.After(p.Departure) || days[len(days)-1].Begin.After(p.Arrival) {
			t.Errorf("%q: days %s do not cover the passage", text, clockText(c))
		}
	})
}
