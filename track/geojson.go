package track

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"reflect"
	"strings"

	"github.com/paulmach/orb"
)

// waypointNM is how near a Point must lie to a vertex to name it.
const waypointNM = 0.1

// ReadGeoJSON reads a route from GeoJSON (RFC 7946): a FeatureCollection, a
// Feature or a bare geometry holding one LineString, or one MultiLineString
// cut at the antimeridian (section 3.1.9), whose parts are joined again.
//
// Points with a name, within 0.1 NM of a vertex, name that waypoint; their
// property stay_h is a stay there, in hours. The line's properties name,
// departure and arrival (RFC 3339), speed_kn, sailing and eye_m fill the Route.
// speed_kn and sailing may be lists with a value or null for each leg,
// coordTimes is one with the time at each vertex or null; in a MultiLineString
// they are lists of such lists. Heights, foreign members, null geometries and
// other kinds of geometry are passed over. Errors are of type *[Error], but
// for those of r.
func ReadGeoJSON(r io.Reader) (*Route, error) {
	data, err := io.ReadAll(limited(r))
	if err != nil {
		return nil, err
	}
	doc, err := decode(data)
	if err != nil {
		return nil, err
	}
	features, err := doc.features("")
	if err != nil {
		return nil, err
	}
	return buildRoute(features)
}

// object is any GeoJSON object: the members of all its types together.
type object struct {
	Type        string          `json:"type"`
	Features    []*object       `json:"features"`
	Geometry    *object         `json:"geometry"`
	Coordinates json.RawMessage `json:"coordinates"`
	Properties  json.RawMessage `json:"properties"`
	CRS         json.RawMessage `json:"crs"`
}

func decode(data []byte) (*object, error) {
	data = bytes.TrimPrefix(data, byteOrderMark)
	var doc *object
	if err := json.Unmarshal(data, &doc); err != nil {
		return nil, jsonError(data, err)
	}
	if doc == nil {
		return nil, &Error{"file", "null", "a GeoJSON object", "export the route as GeoJSON"}
	}
	return doc, nil
}

// jsonError tells where JSON went wrong, or which member has the wrong shape.
func jsonError(data []byte, err error) error {
	var syntax *json.SyntaxError
	var shape *json.UnmarshalTypeError
	switch {
	case errors.As(err, &shape):
		place := "file"
		if shape.Field != "" {
			place = "member " + shape.Field
		}
		allowed := map[reflect.Kind]string{reflect.Slice: "an array", reflect.String: "text"}[shape.Type.Kind()]
		if allowed == "" {
			allowed = "a GeoJSON object"
		}
		return &Error{place, shape.Value, allowed, "export the route as GeoJSON (RFC 7946)"}
	case errors.As(err, &syntax):
		before := data[:min(int(syntax.Offset), len(data))]
		place := fmt.Sprintf("line %d, byte %d", bytes.Count(before, []byte("\n"))+1, len(before)-bytes.LastIndexByte(before, '\n')-1)
		return &Error{place, syntax.Error(), "JSON text", "check that this is a GeoJSON file, whole and unshortened"}
	}
	return &Error{"file", err.Error(), "JSON text", "export the route as GeoJSON (RFC 7946)"}
}

// feature is a geometry of interest with its properties and place in the file.
type feature struct {
	place      string
	geometry   orb.Geometry // orb.Point, orb.LineString or orb.MultiLineString
	properties map[string]json.RawMessage
}

// features flattens the document into the features that matter, in order.
func (o *object) features(place string) ([]feature, error) {
	if err := o.checkCRS(); err != nil {
		return nil, err
	}
	switch o.Type {
	case "FeatureCollection":
		var all []feature
		for i, f := range o.Features {
			if f == nil || f.Type != "Feature" {
				return nil, &Error{fmt.Sprintf("feature %d", i+1), f.describe(), "a Feature", "export the route as GeoJSON (RFC 7946)"}
			}
			some, err := f.features(fmt.Sprintf("feature %d", i+1))
			if err != nil {
				return nil, err
			}
			all = append(all, some...)
		}
		return all, nil
	case "Feature":
		if o.Geometry == nil {
			return nil, nil
		}
		return o.Geometry.geometry(place, o.Properties)
	default:
		return o.geometry(place, nil)
	}
}

func (o *object) describe() string {
	if o == nil {
		return "null"
	}
	return fmt.Sprintf("type %q", o.Type)
}

// checkCRS refuses coordinates that are not longitude and latitude on WGS84.
func (o *object) checkCRS() error {
	crs := string(o.CRS)
	if crs == "" || crs == "null" || strings.Contains(crs, "CRS84") || strings.Contains(crs, "4326") {
		return nil
	}
	return &Error{"member crs", shorten(crs), "CRS84 or EPSG:4326", "convert the file to longitude and latitude on WGS84"}
}

func (o *object) geometry(place string, properties json.RawMessage) ([]feature, error) {
	if err := o.checkCRS(); err != nil {
		return nil, err
	}
	f := feature{place: strings.TrimSpace(place + " " + o.Type)}
	var err error
	switch o.Type {
	case "Point":
		f.geometry, err = readPoint(f.place, o.Coordinates)
	case "LineString":
		f.geometry, err = readLine(f.place, o.Coordinates)
	case "MultiLineString":
		f.geometry, err = readLines(f.place, o.Coordinates)
	case "MultiPoint", "Polygon", "MultiPolygon", "GeometryCollection":
		return nil, nil
	default:
		return nil, &Error{strings.TrimSpace(place + " type"), fmt.Sprintf("%q", shorten(o.Type)),
			"FeatureCollection, Feature, LineString, MultiLineString or Point", "export the route as GeoJSON (RFC 7946)"}
	}
	if err != nil {
		return nil, err
	}
	if len(properties) > 0 {
		if err := json.Unmarshal(properties, &f.properties); err != nil {
			return nil, &Error{f.place + " properties", shorten(string(properties)), "an object or null", "export the route as GeoJSON (RFC 7946)"}
		}
	}
	return []feature{f}, nil
}

// buildRoute finds the one line among the features and names its waypoints.
func buildRoute(features []feature) (*Route, error) {
	var line *feature
	var points []feature
	for i, f := range features {
		if _, ok := f.geometry.(orb.Point); ok {
			points = append(points, f)
			continue
		}
		if line != nil {
			return nil, &Error{f.place, "a second line", "one line in a file", "keep the route to be sailed, drop the other lines"}
		}
		line = &features[i]
	}
	if line == nil {
		return nil, &Error{"file", "no line", "one LineString, the route", "draw the route as a line and export it again"}
	}
	vertices, err := line.waypoints(points)
	if err != nil {
		return nil, err
	}
	r, err := newRoute(vertices, len(vertices))
	if err != nil {
		return nil, err
	}
	if err := line.fill(r); err != nil {
		return nil, err
	}
	return r, nil
}
