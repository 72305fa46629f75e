package track

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"slices"

	"github.com/paulmach/orb"
)

const coordinateHint = "GeoJSON positions are [longitude, latitude] in degrees"

// The readers below check what a lenient decoder lets through: positions that
// are null or too short, members that are null, values out of range. Range of
// longitude is for checkLongitudes, which sees the neighbours.

func readPoint(place string, raw json.RawMessage) (orb.Point, error) {
	var c []*float64
	if err := decodeCoordinates(place, raw, &c); err != nil {
		return orb.Point{}, err
	}
	return point(place, c)
}

func readLine(place string, raw json.RawMessage) (orb.LineString, error) {
	var c [][]*float64
	if err := decodeCoordinates(place, raw, &c); err != nil {
		return nil, err
	}
	return lineString(place, c)
}

func readLines(place string, raw json.RawMessage) (orb.MultiLineString, error) {
	var c [][][]*float64
	if err := decodeCoordinates(place, raw, &c); err != nil {
		return nil, err
	}
	var lines orb.MultiLineString
	for i, part := range c {
		line, err := lineString(fmt.Sprintf("%s part %d", place, i+1), part)
		if err != nil {
			return nil, err
		}
		lines = append(lines, line)
	}
	return lines, nil
}

func decodeCoordinates(place string, raw json.RawMessage, into any) error {
	if len(raw) == 0 {
		return &Error{place, "no coordinates", "an array of positions", coordinateHint}
	}
	if err := json.Unmarshal(raw, into); err != nil {
		met := err.Error()
		if shape := (*json.UnmarshalTypeError)(nil); errors.As(err, &shape) {
			met = shape.Value
		}
		return &Error{place + " coordinates", met, "numbers in arrays", coordinateHint}
	}
	return nil
}

func lineString(place string, c [][]*float64) (orb.LineString, error) {
	if len(c) < 2 {
		return nil, &Error{place, fmt.Sprintf("%d point(s)", len(c)), "two or more", "draw the route from departure to arrival"}
	}
	line := make(orb.LineString, len(c))
	for i, p := range c {
		var err error
		if line[i], err = point(fmt.Sprintf("%s point %d", place, i+1), p); err != nil {
			return nil, err
		}
	}
	return line, nil
}

func point(place string, c []*float64) (orb.Point, error) {
	if len(c) < 2 || c[0] == nil || c[1] == nil {
		return orb.Point{}, &Error{place, "a position without two numbers", "longitude and latitude", coordinateHint}
	}
	lon, lat := *c[0], *c[1]
	if math.Abs(lat) > 90 {
		hint := coordinateHint
		if math.Abs(lon) <= 90 && math.Abs(lat) <= 180 {
			hint = "longitude and latitude look swapped: " + coordinateHint
		}
		return orb.Point{}, &Error{place, fmt.Sprintf("latitude %v", lat), "-90 to 90", hint}
	}
	if math.Abs(lon) > 360 {
		return orb.Point{}, longitudeError(place, lon)
	}
	return orb.Point{lon, lat}, nil
}

func longitudeError(place string, lon float64) error {
	return &Error{place, fmt.Sprintf("longitude %v", lon), "-180 to 180", coordinateHint}
}

// vertices turns the line into waypoints with longitudes in (-180°, 180°].
func (f *feature) vertices() ([]Waypoint, error) {
	line, ok := f.geometry.(orb.LineString)
	if parts, multi := f.geometry.(orb.MultiLineString); multi {
		var err error
		if line, err = f.join(parts); err != nil {
			return nil, err
		}
	} else if !ok {
		return nil, fmt.Errorf("%s: not a line", f.place)
	}
	if err := f.checkLongitudes(line); err != nil {
		return nil, err
	}
	vertices := make([]Waypoint, len(line))
	for i, p := range line {
		vertices[i].Position = PositionFromDeg(p.Lat(), p.Lon())
	}
	return vertices, nil
}

// checkLongitudes lets a longitude pass ±180° only where the line runs there
// from inside the range by steps of less than half a turn: a plain crossing.
func (f *feature) checkLongitudes(line orb.LineString) error {
	inside := false
	for _, p := range line {
		inside = inside || math.Abs(p.Lon()) <= 180
	}
	for i, p := range line {
		if math.Abs(p.Lon()) <= 180 {
			continue
		}
		plain := inside && (i == 0 || math.Abs(p.Lon()-line[i-1].Lon()) < 180) &&
			(i == len(line)-1 || math.Abs(p.Lon()-line[i+1].Lon()) < 180)
		if !plain {
			return longitudeError(fmt.Sprintf("%s point %d", f.place, i+1), p.Lon())
		}
	}
	return nil
}

// join puts the parts of a line cut at the antimeridian together again. The
// cut's own vertex is dropped where it lies on the straight line, in longitude
// and latitude, between its neighbours: then the cut made it, not the sailor.
func (f *feature) join(parts orb.MultiLineString) (orb.LineString, error) {
	if len(parts) == 0 {
		return nil, &Error{f.place, "no parts", "one or more", "draw the route as one line"}
	}
	line := slices.Clone(parts[0])
	for i, next := range parts[1:] {
		end, start := line[len(line)-1], next[0]
		if math.Abs(end.Lon()) != 180 || start.Lon() != -end.Lon() || math.Abs(end.Lat()-start.Lat()) > 1e-6 {
			return nil, &Error{
				fmt.Sprintf("%s part %d", f.place, i+2), "a second line, apart from the first",
				"parts that meet at longitude 180 and -180 on one latitude (RFC 7946, 3.1.9)", "draw the route as one line",
			}
		}
		if straight(line[len(line)-2], end, next[1]) {
			line = line[:len(line)-1]
		}
		line = append(line, next[1:]...)
	}
	return line, nil
}

// straight tells whether the cut vertex lies within 0.1' of the straight line
// between its neighbours, longitudes taken as running on across ±180°. Where
// they lie half a turn or more apart the vertex stays: without it the leg would
// go the other way round.
func straight(a, cut, b orb.Point) bool {
	before, after := wrapDeg(cut.Lon()-a.Lon()), wrapDeg(b.Lon()-cut.Lon())
	run := before + after
	if run == 0 || math.Abs(run) >= 180 {
		return false
	}
	onLine := a.Lat() + (b.Lat()-a.Lat())*before/run
	return math.Abs(onLine-cut.Lat()) < 0.1/60
}
