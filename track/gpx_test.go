package track

import (
	"bytes"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"runtime"
	"strings"
	"testing"
	"time"
)

const gpxHead = `<?xml version="1.0" encoding="UTF-8"?><gpx xmlns="http://www.topografix.com/GPX/1/1" version="1.1" creator="test">`

// The elements are those of the GPX 1.1 schema (memory); ships are invented.
var goodGPX = []struct{ name, in, want, timings string }{
	{"route", gpxHead + `<metadata><name>Whole file</name><time>2026-01-01T00:00:00Z</time></metadata><wpt lat="1" lon="2"><name>Elsewhere</name></wpt>
		<rte><name>Cutter Brine</name><rtept lat="50" lon="-5"><ele>0</ele><time>2026-11-20T12:00:00Z</time><name>Out</name></rtept><rtept lat="48" lon="-12"><extensions><any xmlns="urn:any"><b/></any></extensions></rtept></rte></gpx>`,
		"Out 50.000 -5.000; 48.000 -12.000", "Out 20T12:00 - 0s 0; - - 0s 0"},
	{"track of two segments", gpxHead + `<trk><trkseg><trkpt lat="0" lon="0"/><trkpt lat="0" lon="1"/></trkseg><trkseg><trkpt lat="0" lon="2"/></trkseg></trk></gpx>`, "0.000 0.000; 0.000 1.000; 0.000 2.000", "- - 0s 0; - - 0s 0; - - 0s 0"},
	{"a stay", gpxHead + `<rte><rtept lat="0" lon="0"/><rtept lat="0" lon="1"><time>2026-11-20T12:00:00Z</time></rtept><rtept lat="0" lon="1"><time>2026-11-20T18:00:00+02:00</time></rtept><rtept lat="0" lon="2"/></rte></gpx>`,
		"0.000 0.000; 0.000 1.000; 0.000 2.000", "- - 0s 0; 20T12:00 20T16:00 0s 0; - - 0s 0"},
	{"GPX 1.0", `<gpx xmlns="http://www.topografix.com/GPX/1/0" version="1.0"><name>Old</name><rte><rtept lat="0" lon="179"/><rtept lat="0" lon="-179"/></rte></gpx>`, "0.000 179.000; 0.000 -179.000", "- - 0s 0; - - 0s 0"},
	{"no namespace, prefixes, byte order mark", "\xef\xbb\xbf" + `<g:gpx xmlns:g="http://www.topografix.com/GPX/1/1" version="1.1"><g:rte><g:rtept lat="0" lon="0"/><g:rtept lat="1" lon="0"/></g:rte></g:gpx>` + "\n<!-- end -->\n", "0.000 0.000; 1.000 0.000", "- - 0s 0; - - 0s 0"},
	{"bare", `<gpx><rte><rtept lat=" 0 " lon="0"/><rtept lat="1" lon="1e1"/></rte></gpx>`, "0.000 0.000; 1.000 10.000", "- - 0s 0; - - 0s 0"},
}

func TestReadGPX(t *testing.T) {
	for _, c := range goodGPX {
		t.Run(c.name, func(t *testing.T) {
			r, err := Read(strings.NewReader(c.in))
			if err != nil {
				t.Fatal(err)
			}
			if got := routeText(r); got != c.want {
				t.Errorf("waypoints %s\nwant      %s", got, c.want)
			}
			if got := timingText(r); got != c.timings {
				t.Errorf("timings %s\nwant    %s", got, c.timings)
			}
		})
	}
	r, err := Read(strings.NewReader(goodGPX[0].in))
	if err != nil || r.Name != "Cutter Brine" {
		t.Errorf("name %q, %v", r.Name, err)
	}
	if r, err := Read(strings.NewReader(goodGPX[3].in)); err != nil || r.Name != "Old" {
		t.Errorf("name %q, %v; want that of the file", r.Name, err)
	}
}

// bomb expands to 10^9 letters where entities are resolved.
const bomb = `<?xml version="1.0"?><!DOCTYPE gpx [<!ENTITY a "aaaaaaaaaa"><!ENTITY b "&a;&a;&a;&a;&a;&a;&a;&a;&a;&a;">]><gpx><rte><name>&b;</name></rte></gpx>`

var badXML = []struct{ name, in, place, met, allowed, hint string }{
	{"cut short", gpxHead + `<rte><rtept lat="0" lon="0">`, "line 1", "unexpected EOF", "XML", "whole"},
	{"cut in a tag", gpxHead + `<rte><rtept lat="0`, "line 1", "unexpected EOF", "XML", "whole"},
	{"nothing but a comment", `<!-- nothing -->`, "file", "no element", "a route", "export"},
	{"entity bomb", bomb, "line 1: file", "<!DOCTYPE gpx", "no document type", "export"},
	{"outside entity", `<!DOCTYPE gpx SYSTEM "file:///etc/passwd"><gpx/>`, "file", "DOCTYPE", "no document type", "export"},
	{"unknown entity", `<gpx><rte><name>&secret;</name></rte></gpx>`, "line 1", "invalid character entity", "XML", "whole"},
	{"another document", `<html/>`, "root element", "html", "gpx of http://www.topografix.com/GPX/1/1, or route of http://www.cirm.org/RTZ/1/0", "export"},
	{"another namespace", `<gpx xmlns="urn:other"/>`, "element gpx", "namespace urn:other", "http://www.topografix.com/GPX/1/1 or", "export"},
	{"latin-1", `<?xml version="1.0" encoding="ISO-8859-1"?><gpx/>`, "file", `encoding "ISO-8859-1"`, "UTF-8", "export"},
	{"XML 1.1", `<?xml version="1.1"?><gpx/>`, "file", `unsupported version "1.1"`, "XML 1.0", "export"},
	{"two roots", `<gpx><rte><rtept lat="0" lon="0"/><rtept lat="1" lon="0"/></rte></gpx><gpx/>`, "file", "a second root element", "one", "export"},
	{"deep", `<gpx>` + strings.Repeat("<a>", 100), "file", "elements nested deeper", "32", "export"},
	{"UTF-16", "\xff\xfe<\x00g\x00", "file", "UTF-16", "UTF-8", "save"},

	{"no line", gpxHead + `</gpx>`, "file", "no route and no track", "one route", "GPX"},
	{"two routes", gpxHead + `<rte><name>One</name></rte><rte><name>Two</name></rte></gpx>`, "file", `2 routes: 1 "One", 2 "Two"`, "one route", "alone"},
	{"two tracks", gpxHead + `<trk/><trk/></gpx>`, "file", "2 tracks", "one track", "alone"},
	{"an empty route", gpxHead + `<rte/></gpx>`, "line", "0 point(s)", "two or more", "draw"},
	{"no latitude", gpxHead + "<rte>\n<rtept lon=\"0\"/></rte></gpx>", "line 2: rtept attribute lat", "missing", "degrees", "export"},
	{"latitude 91", gpxHead + `<rte><rtept lat="91" lon="0"/></rte></gpx>`, "rtept attribute lat", `"91"`, "-90 to 90", "export"},
	{"longitude NaN", gpxHead + `<rte><rtept lat="9" lon="NaN"/></rte></gpx>`, "rtept attribute lon", `"NaN"`, "-180 to 180", "export"},
	{"comma", gpxHead + `<rte><rtept lat="9,5" lon="0"/></rte></gpx>`, "rtept attribute lat", `"9,5"`, "-90 to 90", "export"},
	{"time without zone", gpxHead + `<rte><rtept lat="9" lon="0"><time>2026-11-20T12:00:00</time></rtept></rte></gpx>`, "rtept time", "2026-11-20T12:00:00", "with its zone", "export"},
	{"date", gpxHead + `<trk><trkseg><trkpt lat="9" lon="0"><time>2026-11-20</time></trkpt></trkseg></trk></gpx>`, "trkpt time", "2026-11-20", "with its zone", "export"},
}

func TestReadXMLRefuses(t *testing.T) {
	for _, c := range badXML {
		t.Run(c.name, func(t *testing.T) {
			r, err := Read(strings.NewReader(c.in))
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
			if r != nil {
				t.Errorf("a route came with the error: %s", routeText(r))
			}
		})
	}
}

func FuzzReadXML(f *testing.F) {
	for _, c := range goodGPX {
		f.Add([]byte(c.in))
	}
	for _, c := range badXML {
		f.Add([]byte(c.in))
	}
	for _, c := range goodRTZ {
		f.Add([]byte(c.in))
	}
	for _, c := range badRTZ {
		f.Add([]byte(c.in))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		r, err := Read(bytes.NewReader(data))
		if err != nil {
			wantPlainError(t, err)
			return
		}
		checkRoute(t, r)
		for _, s := range []Sailing{Rhumb, GreatCircle} {
			checkSailed(t, r, s)
		}
	})
}

// A GPX that is written is read again as the same passage, but for the sailing,
// which GPX has not: along meridian and equator the two are one.
func TestGPXRoundTrip(t *testing.T) {
	p, err := onEquator(map[int]Timing{1: {Stay: 5 * time.Hour}}, 170, 178, -176, -160).Sail(Orders{Departure: noon, SpeedKn: 10})
	if err != nil {
		t.Fatal(err)
	}
	var b bytes.Buffer
	if err := WriteGPX(&b, p, p.HourlyMarks()); err != nil {
		t.Fatal(err)
	}
	r, err := Read(&b)
	if err != nil {
		t.Fatal(err)
	}
	q, err := r.Sail(Orders{})
	if err != nil {
		t.Fatal(err)
	}
	if a, b := scheduleText(p), scheduleText(q); a != b {
		t.Errorf("comes back as %s\nwant          %s", b, a)
	}
}

// bigTrack writes a track of n points, one a second at some 12 kn on a course
// that wanders, with the jitter of a receiver.
func bigTrack(n int) []byte {
	rng := rand.New(rand.NewPCG(3, 4))
	var b bytes.Buffer
	b.WriteString(gpxHead + "<trk><name>Long haul</name><trkseg>\n")
	lat, lon, course := 40.0, -20.0, 4.0
	for i := range n {
		course += 0.002 * rng.NormFloat64()
		lat += 12.0 / 3600 / 60 * math.Cos(course)
		lon += 12.0 / 3600 / 60 * math.Sin(course) / math.Cos(lat*math.Pi/180)
		at := noon.Add(time.Duration(i) * time.Second).Format(time.RFC3339)
		fmt.Fprintf(&b, "<trkpt lat=\"%.6f\" lon=\"%.6f\"><ele>3.2</ele><time>%s</time></trkpt>\n", lat+2e-6*rng.NormFloat64(), lon+2e-6*rng.NormFloat64(), at)
	}
	b.WriteString("</trkseg></trk></gpx>")
	return b.Bytes()
}

// Thinned, the track keeps within 0.05 NM at each of its times.
func TestThinning(t *testing.T) {
	data := bigTrack(40000)
	r, err := Read(bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	p, err := r.Sail(Orders{})
	if err != nil {
		t.Fatal(err)
	}
	whole := readAllPoints(t, data)
	worst := 0.0
	for _, w := range whole {
		worst = math.Max(worst, apart(w.Position, p.At(w.ETA).Position))
	}
	t.Logf("%d points to %d, worst %.4f NM; notes %q", len(whole), len(r.Waypoints), worst, r.Notes)
	if len(r.Notes) != 1 || !strings.Contains(r.Notes[0], "40000 points are thinned to ") {
		t.Errorf("notes %q, want one on thinning", r.Notes)
	}
	if worst > ThinnedNM || len(r.Waypoints) > len(whole)/20 {
		t.Errorf("%d points to %d, worst %.4f NM; want at most %v NM and a twentieth of the points", len(whole), len(r.Waypoints), worst, ThinnedNM)
	}
}

// readAllPoints scans the test's own lines without the reader.
func readAllPoints(t *testing.T, data []byte) (all []Waypoint) {
	t.Helper()
	for _, line := range strings.Split(string(data), "\n") {
		var lat, lon float64
		var at string
		line = strings.NewReplacer(`"`, " ", "<time>", " ", "</time>", " ", "<ele>3.2</ele>", " ").Replace(line)
		if n, _ := fmt.Sscanf(line, "<trkpt lat= %f  lon= %f >  %s", &lat, &lon, &at); n == 3 {
			when, err := time.Parse(time.RFC3339, at)
			if err != nil {
				t.Fatal(err)
			}
			all = append(all, Waypoint{Position: PositionFromDeg(lat, lon), Timing: Timing{ETA: when}})
		}
	}
	if len(all) == 0 {
		t.Fatal("no points scanned")
	}
	return all
}

// Lines made to be slow to thin: a saw of 200,000 teeth is refused in time.
func TestThinningOfASaw(t *testing.T) {
	line := make([]Waypoint, 200000)
	for i := range line {
		line[i].Position = PositionFromDeg(float64(i%2), -170+340*float64(i)/200000)
	}
	_, err := newRoute(line, len(line))
	checkError(t, err, "line", "over 10000 points", "after thinning", "part of the track")
}

// The measure of a long track: go test ./track -run XXX -bench HalfMillion -benchtime 1x
func BenchmarkHalfMillionPoints(b *testing.B) {
	data := bigTrack(500000)
	var before, after runtime.MemStats
	runtime.GC()
	runtime.ReadMemStats(&before)
	for b.Loop() {
		if _, err := Read(bytes.NewReader(data)); err != nil {
			b.Fatal(err)
		}
	}
	runtime.ReadMemStats(&after)
	b.ReportMetric(float64(len(data))/1e6, "MB_file")
	b.ReportMetric(float64(after.HeapSys-before.HeapSys)/1e6, "MB_heap_grown")
}

func TestReadTellsFormatsApart(t *testing.T) {
	for name, in := range map[string]string{"GeoJSON": " \n" + bareLine, "GPX": "\n\t" + goodGPX[5].in, "RTZ": goodRTZ[0].in} {
		if _, err := Read(strings.NewReader(in)); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
	if _, err := Read(strings.NewReader("")); err == nil {
		t.Error("an empty file is read")
	}
	f, err := os.Open(".")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	if _, err := Read(f); err == nil {
		t.Error("a folder is read")
	}
}
