package track

import (
	"errors"
	"io"
	"strings"
	"testing"
	"testing/iotest"
)

// Each bad input must be refused, with these words in the error's four parts.
var badRoutes = []struct{ name, in, place, met, allowed, hint string }{
	{"empty", "", "line 1", "unexpected end", "JSON text", "whole and unshortened"},
	{"not JSON", "hello", "line 1, byte 1", "invalid character 'h'", "JSON text", "GeoJSON file"},
	{"cut short", "{\n\"type\":\"LineString\",\n\"coordinates\":[[0", "line 3, byte 17", "unexpected end", "JSON text", "whole and unshortened"},
	{"something after the end", bareLine + "x", "line 1, byte 61", "after top-level value", "JSON text", "GeoJSON file"},
	{"nested too deep", `{"type":"LineString","coordinates":` + strings.Repeat("[", 10001), "line 1", "max depth", "JSON text", "GeoJSON file"},
	{"geometries nested too deep", strings.Repeat(`{"geometry":`, 10001), "line 1", "max depth", "JSON text", "GeoJSON file"},
	{"null", "null", "file", "null", "a GeoJSON object", "export"},
	{"a number", "5", "file", "number", "a GeoJSON object", "export"},
	{"an array", "[1]", "file", "array", "a GeoJSON object", "export"},
	{"no type", `{"coordinates":[[0,1],[2,3]]}`, "type", `""`, "FeatureCollection", "RFC 7946"},
	{"unknown type", `{"type":"Route"}`, "type", `"Route"`, "LineString", "RFC 7946"},
	{"type a number", `{"type":5}`, "member type", "number", "text", "RFC 7946"},
	{"feature null", `{"type":"FeatureCollection","features":[null]}`, "feature 1", "null", "a Feature", "RFC 7946"},
	{"bare geometry as feature", collection(bareLine), "feature 1", `type "LineString"`, "a Feature", "RFC 7946"},
	{"features an object", `{"type":"FeatureCollection","features":{}}`, "member features", "object", "an array", "RFC 7946"},
	{"geometry a number", `{"type":"Feature","geometry":5}`, "member geometry", "number", "a GeoJSON object", "RFC 7946"},
	{"no features", `{"type":"FeatureCollection"}`, "file", "no line", "one LineString", "draw the route"},
	{"no line", collection(pointFeature("A", "[0,1]")), "file", "no line", "one LineString", "draw the route"},
	{"collection of null", `{"type":"GeometryCollection","geometries":[null]}`, "file", "no line", "one LineString", "draw the route"},
	{"two lines", collection(lineFeature(`[[0,1],[2,3]]`, `{}`), lineFeature(`[[0,1],[2,3]]`, `{}`)), "feature 2 LineString", "a second line", "one line", "drop the other"},

	{"no points", `{"type":"LineString","coordinates":[]}`, "LineString", "0 point(s)", "two or more", "departure to arrival"},
	{"one point", `{"type":"LineString","coordinates":[[0,1]]}`, "LineString", "1 point(s)", "two or more", "departure to arrival"},
	{"coordinates null", `{"type":"LineString","coordinates":null}`, "LineString", "0 point(s)", "two or more", "departure to arrival"},
	{"coordinates missing", collection(`{"type":"Feature","geometry":{"type":"LineString"}}`), "feature 1 LineString", "no coordinates", "array of positions", "[longitude, latitude]"},
	{"no parts", multiLine(`[]`), "MultiLineString", "no parts", "one or more", "one line"},
	{"empty part", multiLine(`[[[0,1],[2,3]],[]]`), "part 2", "0 point(s)", "two or more", "departure to arrival"},
	{"short position", `{"type":"LineString","coordinates":[[0,1],[-4.1]]}`, "point 2", "without two numbers", "longitude and latitude", "[longitude, latitude]"},
	{"null latitude", `{"type":"LineString","coordinates":[[-4.1,null],[0,1]]}`, "point 1", "without two numbers", "longitude and latitude", "[longitude, latitude]"},
	{"null position", `{"type":"LineString","coordinates":[null,[0,1]]}`, "point 1", "without two numbers", "longitude and latitude", "[longitude, latitude]"},
	{"point null", collection(pointFeature("A", "null")), "feature 1 Point", "without two numbers", "longitude and latitude", "[longitude, latitude]"},
	{"text coordinates", `{"type":"LineString","coordinates":[["0","1"],[2,3]]}`, "LineString coordinates", "string", "numbers in arrays", "[longitude, latitude]"},
	{"too shallow", `{"type":"LineString","coordinates":[0,1]}`, "LineString coordinates", "number", "numbers in arrays", "[longitude, latitude]"},
	{"not a number", `{"type":"LineString","coordinates":[[NaN,1],[2,3]]}`, "line 1, byte 38", "invalid character 'N'", "JSON text", "GeoJSON file"},
	{"past float64", `{"type":"LineString","coordinates":[[1e400,1],[2,3]]}`, "LineString coordinates", "number 1e400", "numbers in arrays", "[longitude, latitude]"},

	{"latitude 91", `{"type":"LineString","coordinates":[[100,91],[2,3]]}`, "point 1", "latitude 91", "-90 to 90", "[longitude, latitude]"},
	{"swapped", `{"type":"LineString","coordinates":[[50,-4],[35.6,139.7]]}`, "point 2", "latitude 139.7", "-90 to 90", "look swapped"},
	{"longitude 540", `{"type":"LineString","coordinates":[[0,1],[540,3]]}`, "point 2", "longitude 540", "-180 to 180", "[longitude, latitude]"},
	{"all past 180", `{"type":"LineString","coordinates":[[190,1],[200,3]]}`, "point 1", "longitude 190", "-180 to 180", "[longitude, latitude]"},
	{"leap past 180", `{"type":"LineString","coordinates":[[-10,1],[190,3]]}`, "point 2", "longitude 190", "-180 to 180", "[longitude, latitude]"},
	{"pole", `{"type":"LineString","coordinates":[[0,80],[2,90]]}`, "point 2 of the line", "latitude 90.0000", "neither course nor ship's time", "short of the pole"},
	{"all one place", `{"type":"LineString","coordinates":[[0,1],[0,1],[0,1]]}`, "line", "3 point(s), all at one place", "two or more different", "draw the route"},
	{"all one place, longitude a turn apart", `{"type":"LineString","coordinates":[[180,1],[-180,1]]}`, "line", "2 point(s), all at one place", "two or more different", "draw the route"},
	{"parts apart", multiLine(`[[[0,1],[2,3]],[[4,5],[6,7]]]`), "part 2", "a second line", "meet at longitude 180", "one line"},
	{"parts on two latitudes", multiLine(`[[[170,1],[180,2]],[[-180,3],[-170,4]]]`), "part 2", "a second line", "on one latitude", "one line"},
	{"parts in the wrong order", multiLine(`[[[-180,2],[-170,3]],[[170,1],[180,2]]]`), "part 2", "a second line", "meet at longitude 180", "one line"},
	{"other datum", `{"type":"LineString","crs":{"type":"name","properties":{"name":"EPSG:3857"}},"coordinates":[[0,1],[2,3]]}`, "crs", "EPSG:3857", "CRS84", "WGS84"},
	{"other datum inside a Feature", `{"type":"Feature","geometry":{"type":"LineString","crs":{"name":"EPSG:3857"},"coordinates":[[0,1],[2,3]]}}`, "crs", "EPSG:3857", "CRS84", "WGS84"},

	{"properties an array", lineFeature(`[[0,1],[2,3]]`, `["a",`+"\n"+`"b"]`), "properties", `["a", "b"]`, "an object or null", "RFC 7946"},
	{"departure without zone", lineFeature(`[[0,1],[2,3]]`, `{"departure":"2026-11-20T12:00:00"}`), "property departure", `"2026-11-20T12:00:00"`, "RFC 3339 with a zone", "flag"},
	{"departure a number", lineFeature(`[[0,1],[2,3]]`, `{"departure":20261120}`), "property departure", "20261120", "text", "flag"},
	{"departure of no day", lineFeature(`[[0,1],[2,3]]`, `{"departure":"2026-02-30T12:00:00Z"}`), "property departure", "2026-02-30", "RFC 3339", "flag"},
	{"speed text", lineFeature(`[[0,1],[2,3]]`, `{"speed_kn":"12 kn"}`), "property speed_kn", `"12 kn"`, "a number above 0", "flag"},
	{"speed negative", lineFeature(`[[0,1],[2,3]]`, `{"speed_kn":-5}`), "property speed_kn", "-5", "a number above 0", "flag"},
	{"speed past float64", lineFeature(`[[0,1],[2,3]]`, `{"speed_kn":1e400}`), "property speed_kn", "1e400", "a number above 0", "flag"},
	{"eye zero", lineFeature(`[[0,1],[2,3]]`, `{"eye_m":0}`), "property eye_m", "0", "a number above 0", "flag"},
	{"sailing unknown", lineFeature(`[[0,1],[2,3]]`, `{"sailing":"direct"}`), "property sailing", `"direct"`, "rhumb or great-circle", "flag"},
	{"sailing an object", lineFeature(`[[0,1],[2,3]]`, `{"sailing":{"a":[1]}}`), "property sailing", `{"a":[1]}`, "text", "flag"},
	{"name a number", lineFeature(`[[0,1],[2,3]]`, `{"name":7}`), "property name", "7", "text", "flag"},
}

func TestReadGeoJSONRefuses(t *testing.T) {
	for _, c := range badRoutes {
		t.Run(c.name, func(t *testing.T) {
			r, err := ReadGeoJSON(strings.NewReader(c.in))
			checkError(t, err, c.place, c.met, c.allowed, c.hint)
			if r != nil {
				t.Errorf("a route came with the error: %s", routeText(r))
			}
		})
	}
}

func TestReadGeoJSONTooLong(t *testing.T) {
	spaces := iotest.DataErrReader(io.LimitReader(repeat(' '), MaxRouteBytes+1))
	_, err := ReadGeoJSON(io.MultiReader(strings.NewReader(bareLine), spaces))
	checkError(t, err, "file", "over 96 MB", "at most", "export the route alone")
}

func TestReadGeoJSONPassesReadErrorOn(t *testing.T) {
	broken := errors.New("disk gone")
	if _, err := ReadGeoJSON(iotest.ErrReader(broken)); !errors.Is(err, broken) {
		t.Errorf("error %v, want %v", err, broken)
	}
}

// repeat reads as one byte without end.
type repeat byte

func (b repeat) Read(p []byte) (int, error) {
	for i := range p {
		p[i] = byte(b)
	}
	return len(p), nil
}

// checkError wants an *Error with these words in its parts, on one line and
// without the words of the program's own types.
func checkError(t *testing.T, err error, place, met, allowed, hint string) {
	t.Helper()
	var e *Error
	if !errors.As(err, &e) {
		t.Fatalf("error %v of type %T, want *Error", err, err)
	}
	for _, part := range []struct{ name, got, want string }{
		{"place", e.Place, place}, {"met", e.Met, met}, {"allowed", e.Allowed, allowed}, {"hint", e.Hint, hint},
	} {
		if part.want == "" || !strings.Contains(part.got, part.want) {
			t.Errorf("%s %q, want %q in it", part.name, part.got, part.want)
		}
		for _, odd := range []string{"\n", "Go value", "interface", "map[", "json:", "%!"} {
			if strings.Contains(part.got, odd) {
				t.Errorf("%s %q has %q in it", part.name, part.got, odd)
			}
		}
	}
	if want := e.Place + ": " + e.Met + " (" + e.Allowed + ")"; e.Error() != want {
		t.Errorf("error text %q, want %q", e.Error(), want)
	}
}
