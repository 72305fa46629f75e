package track

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
	"time"
)

// lineFeature writes a Feature with a LineString; props is a JSON object.
func lineFeature(coordinates, props string) string {
	return `{"type":"Feature","properties":` + props +
		`,"geometry":{"type":"LineString","coordinates":` + coordinates + `}}`
}

// pointFeature writes a Feature with a named Point.
func pointFeature(name, coordinates string) string {
	return `{"type":"Feature","properties":{"name":"` + name +
		`"},"geometry":{"type":"Point","coordinates":` + coordinates + `}}`
}

func collection(features ...string) string {
	return `{"type":"FeatureCollection","features":[` + strings.Join(features, ",") + `]}`
}

func multiLine(coordinates string) string {
	return `{"type":"MultiLineString","coordinates":` + coordinates + `}`
}

// routeText writes waypoints as "name lat lon; ...", degrees to 1e-3°.
func routeText(r *Route) string {
	var all []string
	for _, w := range r.Waypoints {
		all = append(all, strings.TrimSpace(fmt.Sprintf("%s %.3f %.3f", w.Name, w.Lat.Deg(), w.Lon.Deg())))
	}
	return strings.Join(all, "; ")
}

const bareLine = `{"type":"LineString","coordinates":[[-4.1,50.3],[-10,48.5]]}`

// The routes are invented. The rules for types, heights, foreign members, null
// and the cut at the antimeridian are those of RFC 7946, sections 3, 3.1.1,
// 3.1.9, 3.2 and 6.1 (memory).
var goodRoutes = []struct{ name, in, want string }{
	{"bare LineString", bareLine, "50.300 -4.100; 48.500 -10.000"},
	{"Feature", lineFeature(`[[-4.1,50.3],[-10,48.5]]`, `{}`), "50.300 -4.100; 48.500 -10.000"},
	{"FeatureCollection", collection(lineFeature(`[[0,1],[2,3],[4,5]]`, `{}`)), "1.000 0.000; 3.000 2.000; 5.000 4.000"},
	{"null properties", lineFeature(`[[0,1],[2,3]]`, `null`), "1.000 0.000; 3.000 2.000"},
	{"no properties", `{"type":"Feature","geometry":` + bareLine + `}`, "50.300 -4.100; 48.500 -10.000"},
	{"byte order mark", "\xef\xbb\xbf" + bareLine, "50.300 -4.100; 48.500 -10.000"},
	{"heights and measures", `{"type":"LineString","coordinates":[[0,1,12],[2,3,-4,99]]}`, "1.000 0.000; 3.000 2.000"},
	{"foreign members", `{"type":"LineString","bbox":[0,1,2,3],"made":{"by":[null]},"coordinates":[[0,1],[2,3]]}`, "1.000 0.000; 3.000 2.000"},
	{"foreign property past float64", lineFeature(`[[0,1],[2,3]]`, `{"serial":1e400}`), "1.000 0.000; 3.000 2.000"},
	{"null geometry", collection(`{"type":"Feature","properties":{},"geometry":null}`, lineFeature(`[[0,1],[2,3]]`, `{}`)), "1.000 0.000; 3.000 2.000"},
	{"polygon beside the line", collection(
		`{"type":"Feature","properties":{},"geometry":{"type":"Polygon","coordinates":[[[0,0],[9,0],[9,9],[0,0]]]}}`,
		lineFeature(`[[0,1],[2,3]]`, `{}`)), "1.000 0.000; 3.000 2.000"},
	{"WGS84 named in crs", `{"type":"LineString","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:OGC:1.3:CRS84"}},` +
		`"coordinates":[[0,1],[2,3]]}`, "1.000 0.000; 3.000 2.000"},
	{"edge of the latitudes", `{"type":"LineString","coordinates":[[0,-89.9],[2,89.9]]}`, "-89.900 0.000; 89.900 2.000"},

	// 0.09 and 0.11 NM from the vertices: a minute of latitude is a mile to within 1 %.
	{"points name waypoints", collection(pointFeature("Near", "[0,50.0015]"), pointFeature("Far", "[3,49.9981]"), lineFeature(`[[0,50],[3,50]]`, `{}`)),
		"Near 50.000 0.000; 50.000 3.000"},
	{"point east of its waypoint", collection(pointFeature("Near", "[0.0023,50]"), pointFeature("Far", "[3.0030,50]"), lineFeature(`[[0,50],[3,50]]`, `{}`)),
		"Near 50.000 0.000; 50.000 3.000"},
	{"first of two points names", collection(pointFeature("One", "[0,1]"), pointFeature("Two", "[0,1]"), lineFeature(`[[0,1],[2,3]]`, `{}`)), "One 1.000 0.000; 3.000 2.000"},
	{"point across the antimeridian", collection(pointFeature("Line", "[-180,1]"), lineFeature(`[[170,1],[180,1],[-170,2]]`, `{}`)),
		"1.000 170.000; Line 1.000 180.000; 2.000 -170.000"},

	{"cut, straight, eastward", multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30]]]`), "10.000 170.000; 30.000 -170.000"},
	{"cut, straight, westward", multiLine(`[[[-170,10],[-180,20]],[[180,20],[170,30]]]`), "10.000 -170.000; 30.000 170.000"},
	{"cut, bent", multiLine(`[[[170,10],[180,21]],[[-180,21],[-170,30]]]`), "10.000 170.000; 21.000 180.000; 30.000 -170.000"},
	{"cut, bent, westward", multiLine(`[[[-170,10],[-180,21]],[[180,21],[170,30]]]`), "10.000 -170.000; 21.000 180.000; 30.000 170.000"},
	{"cut, straight to 0.06'", multiLine(`[[[170,10],[180,20.001]],[[-180,20.001],[-170,30]]]`), "10.000 170.000; 30.000 -170.000"},
	{"cut, bent by 0.3'", multiLine(`[[[170,10],[180,20.005]],[[-180,20.005],[-170,30]]]`), "10.000 170.000; 20.005 180.000; 30.000 -170.000"},
	{"cut twice", multiLine(`[[[170,10],[180,20]],[[-180,20],[-170,30],[-180,40]],[[180,40],[170,50]]]`), "10.000 170.000; 30.000 -170.000; 50.000 170.000"},
	{"one part", multiLine(`[[[0,1],[2,3]]]`), "1.000 0.000; 3.000 2.000"},
	// Without the vertex on the cut this leg would run the other way, over Africa.
	{"cut of a leg over half a turn", multiLine(`[[[10,2],[180,2]],[[-180,2],[-10,2]]]`), "2.000 10.000; 2.000 180.000; 2.000 -10.000"},

	{"eastward past 180", `{"type":"LineString","coordinates":[[170,1],[190,2],[200,3]]}`, "1.000 170.000; 2.000 -170.000; 3.000 -160.000"},
	{"westward past -180", `{"type":"LineString","coordinates":[[-170,1],[-190,2]]}`, "1.000 -170.000; 2.000 170.000"},
	{"begins past 180", `{"type":"LineString","coordinates":[[190,1],[170,2]]}`, "1.000 -170.000; 2.000 170.000"},
	{"-180 is 180", `{"type":"LineString","coordinates":[[-180,1],[-170,2]]}`, "1.000 180.000; 2.000 -170.000"},
}

func TestReadGeoJSON(t *testing.T) {
	for _, c := range goodRoutes {
		t.Run(c.name, func(t *testing.T) {
			r, err := ReadGeoJSON(strings.NewReader(c.in))
			if err != nil {
				t.Fatal(err)
			}
			if got := routeText(r); got != c.want {
				t.Errorf("waypoints %s\nwant      %s", got, c.want)
			}
			if len(r.Notes) > 0 {
				t.Errorf("notes %q, want none", r.Notes)
			}
		})
	}
}

func TestReadGeoJSONProperties(t *testing.T) {
	r, err := ReadGeoJSON(strings.NewReader(lineFeature(`[[0,1],[2,3]]`,
		`{"name":"Azores run","departure":"2026-11-20T12:00:00+02:00","speed_kn":12.5,"sailing":"great-circle","eye_m":9,"stroke":"#333"}`)))
	if err != nil {
		t.Fatal(err)
	}
	if want := time.Date(2026, 11, 20, 10, 0, 0, 0, time.UTC); !r.Waypoints[0].ETD.Equal(want) {
		t.Errorf("departure %v, want %v", r.Waypoints[0].ETD, want)
	}
	if r.Name != "Azores run" || r.SpeedKn != 12.5 || r.EyeM != 9 || r.Sailing == nil || *r.Sailing != GreatCircle {
		t.Errorf("got %+v", r)
	}

	for _, props := range []string{`{}`, `null`, `{"name":null,"departure":null,"speed_kn":null,"sailing":null,"eye_m":null}`, `{"departure":"","sailing":""}`} {
		r, err := ReadGeoJSON(strings.NewReader(lineFeature(`[[0,1],[2,3]]`, props)))
		if err != nil {
			t.Errorf("%s: %v", props, err)
			continue
		}
		if r.Name != "" || r.SpeedKn != 0 || r.EyeM != 0 || r.Sailing != nil || !r.Waypoints[0].ETD.IsZero() {
			t.Errorf("%s: got %+v, want all unset", props, r)
		}
	}
}

// A vertex within 1 m of the one before it is skipped with a note: 0.000005°
// of latitude is 0.55 m, 0.00002° is 2.2 m (WGS84).
func TestRepeatedPoints(t *testing.T) {
	r, err := ReadGeoJSON(strings.NewReader(collection(pointFeature("Horta", "[2,3]"),
		lineFeature(`[[0,1],[0,1],[2,3],[2,3.000005],[2,3.00002]]`, `{}`))))
	if err != nil {
		t.Fatal(err)
	}
	if got, want := routeText(r), "1.000 0.000; Horta 3.000 2.000; Horta 3.000 2.000"; got != want {
		t.Errorf("waypoints %s, want %s", got, want)
	}
	want := []string{"point 2 of the line repeats", "point 4 of the line repeats"}
	if len(r.Notes) != len(want) {
		t.Fatalf("notes %q, want %d", r.Notes, len(want))
	}
	for i := range want {
		if !strings.HasPrefix(r.Notes[i], want[i]) {
			t.Errorf("note %q, want %q...", r.Notes[i], want[i])
		}
	}
}

func TestFileOfGreatestSize(t *testing.T) {
	data := append([]byte(bareLine), bytes.Repeat([]byte(" "), MaxRouteBytes-len(bareLine))...)
	if _, err := ReadGeoJSON(bytes.NewReader(data)); err != nil {
		t.Errorf("%d bytes: %v", len(data), err)
	}
}
