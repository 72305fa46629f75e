package track

import (
	"fmt"
	"strings"
	"testing"
	"time"
)

// Two files written by hand from the structure of IEC 61174 (the public
// schemas' elements, memory): 1.0 with its own spelling and a stay as xsd:time,
// 1.2 with a duration. Ships and voyages are invented.
const rtz10 = `<?xml version="1.0" encoding="UTF-8"?>
<route xmlns="http://www.cirm.org/RTZ/1/0" version="1.0">
 <routeInfo routeName="MV Tern Point, Leixões to Horta" vesselName="Tern Point"/>
 <waypoints>
  <defaultWaypoint radius="0.5"><leg geometryType="Loxodrome" speedMax="12"/></defaultWaypoint>
  <waypoint id="1" name="Leixões"><position lat="41.1" lon="-8.8"/><leg geometryType="Orthodrome"/></waypoint>
  <waypoint id="2" name="Off Santa Maria"><position lat="37.1" lon="-24.9"/><leg geometryType="Orthodrome" speedMax="14"/></waypoint>
  <waypoint id="7" name="Horta"><position lat="38.53" lon="-28.62"/></waypoint>
 </waypoints>
 <schedules><schedule id="1" name="as ordered"><manual>
  <sheduleElement waypointId="1" etd="2027-07-01T06:00:00Z"/>
  <sheduleElement waypointId="2" stay="06:30:00" speed="11"/>
  <sheduleElement waypointId="7" speed="9.5"/>
 </manual></schedule></schedules>
</route>`

const rtz12 = `<?xml version="1.0" encoding="UTF-8"?>
<r:route xmlns:r="http://www.cirm.org/RTZ/1/2" version="1.2">
 <r:routeInfo routeName="MT Gannet Rock"/>
 <r:waypoints>
  <r:waypoint id="10" revision="0"><r:position lat="-36.6" lon="174.9"/></r:waypoint>
  <r:waypoint id="20" revision="0" name="Turn"><r:position lat="-38" lon="-178.5"/><r:leg/></r:waypoint>
  <r:waypoint id="30" revision="1" name="Papeete"><r:position lat="-17.5" lon="-149.6"/><r:leg geometryType="Orthodrome" draughtForward="7"/></r:waypoint>
 </r:waypoints>
 <r:schedules>
  <r:schedule id="1"><r:calculated><r:scheduleElement waypointId="10" etd="2027-01-01T00:00:00Z" speed="99"/></r:calculated></r:schedule>
  <r:schedule id="2"><r:manual>
   <r:scheduleElement waypointId="10" etd="2027-05-03T20:00:00Z"/>
   <r:scheduleElement waypointId="20" eta="2027-05-04T20:00:00Z" stay="P1DT2H30M"/>
   <r:scheduleElement waypointId="30" eta="2027-05-12T12:00:00+12:00"/>
  </r:manual></r:schedule>
 </r:schedules>
 <r:extensions><r:extension manufacturer="none" name="x" version="1"><any/></r:extension></r:extensions>
</r:route>`

var goodRTZ = []struct{ name, in, want string }{
	{"1.0", rtz10, "Leixões - 01T06:00 0s 0; Off Santa Maria - - 6h30m0s 11 great-circle; Horta - - 0s 9.5"},
	{"1.2", rtz12, "- 03T20:00 0s 0; Turn 04T20:00 - 26h30m0s 0; Papeete 12T00:00 - 0s 0 great-circle"},
}

func TestReadRTZ(t *testing.T) {
	for _, c := range goodRTZ {
		r, err := ReadRTZ(strings.NewReader(c.in))
		if err != nil {
			t.Fatal(c.name, err)
		}
		if got := timingText(r); got != c.want {
			t.Errorf("%s: timings %s\nwant    %s", c.name, got, c.want)
		}
		if _, err := r.Sail(Orders{}); err != nil {
			t.Errorf("%s: %v", c.name, err)
		}
	}
	r, err := ReadRTZ(strings.NewReader(rtz10))
	if err != nil || r.Name != "MV Tern Point, Leixões to Horta" || *r.Sailing != Rhumb || len(r.Notes) != 0 {
		t.Errorf("%+v, %v", r, err)
	}
	r, err = ReadRTZ(strings.NewReader(rtz12))
	if want := `["of 3 schedules`; err != nil || strings.HasPrefix(fmt.Sprintf("%q", r.Notes), want) || len(r.Notes) != 2 {
		t.Errorf("notes %q, %v", r.Notes, err)
	}
}

// change is the 1.0 file with something in it put for something else.
func change(old, new string) string { return strings.Replace(rtz10, old, new, 1) }

var badRTZ = []struct{ name, in, place, met, allowed, hint string }{
	{"version 2", change(`version="1.0">`, `version="2.0">`), "route attribute version", `"2.0"`, "1.0, 1.1 or 1.2", "export"},
	{"no version", change(` version="1.0">`, `>`), "route attribute version", `""`, "1.0, 1.1 or 1.2", "export"},
	{"namespace", change("RTZ/1/0", "RTZ/9/9"), "element route", "namespace http://www.cirm.org/RTZ/9/9", "http://www.cirm.org/RTZ/1/0 or", "export"},
	{"no id", change(`id="7" `, ""), "waypoint attribute id", "missing", "a number", "export"},
	{"the same id", change(`id="7"`, `id="2"`), "waypoint attribute id", "2, for the second time", "a number", "export"},
	{"no position", change(`<position lat="38.53" lon="-28.62"/>`, ""), "waypoint 7", "no position", "a position", "export"},
	{"geometry", change("Orthodrome", "Direct"), "leg attribute geometryType", `"Direct"`, "Loxodrome or Orthodrome", "export"},
	{"schedule of nowhere", change(`waypointId="7"`, `waypointId="8"`), "schedule", "waypoint 8", "the id of a waypoint", "schedule"},
	{"stay", change("06:30:00", "six hours"), "sheduleElement attribute stay", `"six hours"`, "PT12H30M", "export"},
	{"a stay of years", change("06:30:00", "P500D"), "sheduleElement attribute stay", `"P500D"`, "at most 400 days", "export"},
	{"speed", change(`speed="9.5"`, `speed="900"`), "sheduleElement attribute speed", `"900"`, "at most 100", "export"},
	{"time", change("2027-07-01T06:00:00Z", "2027-07-01"), "sheduleElement attribute etd", `"2027-07-01"`, "with its zone", "export"},
	{"one waypoint", `<route xmlns="http://www.cirm.org/RTZ/1/1" version="1.1"><waypoints><waypoint id="1"><position lat="0" lon="0"/></waypoint></waypoints></route>`, "file", "1 waypoint(s)", "two or more", "export"},
}

func TestReadRTZRefuses(t *testing.T) {
	for _, c := range badRTZ {
		t.Run(c.name, func(t *testing.T) {
			_, err := ReadRTZ(strings.NewReader(c.in))
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
		})
	}
}

// A schedule that contradicts itself is read, and refused when it is sailed.
func TestContradictingRTZ(t *testing.T) {
	r, err := ReadRTZ(strings.NewReader(change(`stay="06:30:00" speed="11"`, `eta="2027-07-02T06:00:00Z" speed="11"`)))
	if err != nil {
		t.Fatal(err)
	}
	_, err = r.Sail(Orders{})
	checkError(t, err, "waypoint 2 (Off Santa Maria)", "by its time, 2027-07-04", "within a minute or 0.1 kn", "mend")
}

func TestParseStay(t *testing.T) {
	for text, want := range map[string]time.Duration{
		"PT6H": 6 * time.Hour, "P2D": 48 * time.Hour, "P1DT1H1M1.5S": 25*time.Hour + time.Minute + time.Second, "PT90M": 90 * time.Minute, "12:30:00": 12*time.Hour + 30*time.Minute, "00:00:10Z": 10 * time.Second,
	} {
		if got, err := parseStay(text); err != nil || got != want {
			t.Errorf("%q: %v, %v; want %v", text, got, err, want)
		}
	}
	for _, text := range []string{"", "P", "P1Y", "PT-1H", "6h", "1:00:00", "P401D"} {
		if got, err := parseStay(text); err == nil {
			t.Errorf("%q: %v, want an error", text, got)
		}
	}
}
