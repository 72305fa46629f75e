package track

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"

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
