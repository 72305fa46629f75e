package track

import (
	"encoding/json"
	"io"
	"math"
	"time"
)

// jsonFeature is a GeoJSON Feature (RFC 7946, 3.2) as it is written.
type jsonFeature struct {
	Type       string         `json:"type"`
	Properties map[string]any `json:"properties"`
	Geometry   jsonGeometry   `json:"geometry"`
}

type jsonGeometry struct {
	Type        string `json:"type"`
	Coordinates any    `json:"coordinates"`
}

// WriteGeoJSON writes the passage as a GeoJSON FeatureCollection (RFC 7946)
// that [ReadGeoJSON] reads again: the line with times, speeds and sailings, cut
// at the antimeridian (3.1.9); its named waypoints; and the marks as points.
func WriteGeoJSON(w io.Writer, p *Passage, marks []Mark) error {
	features := []jsonFeature{p.lineFeature()}
	for _, c := range p.calls() {
		if c.Name != "" || c.left.After(c.reached) {
			properties := map[string]any{"name": c.Label(), "time": stamp(c.reached), "kind": "waypoint"}
			if stay := c.left.Sub(c.reached).Hours(); stay > 0 {
				properties["stay_h"] = roundTo(stay, 1e4)
			}
			features = append(features, pointOf(c.Position, properties))
		}
	}
	for _, m := range marks {
		features = append(features, pointOf(m.Position, map[string]any{
			"title": m.Title, "description": m.Text, "time": stamp(m.Time), "kind": m.Kind}))
	}
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	return enc.Encode(struct {
		Type     string        `json:"type"`
		Features []jsonFeature `json:"features"`
	}{"FeatureCollection", features})
}

// stamp writes a time to the second.
func stamp(t time.Time) string { return t.UTC().Round(time.Second).Format(time.RFC3339) }

func roundTo(x, scale float64) float64 { return math.Round(x*scale) / scale }

// lonLat is a GeoJSON position to 1e-7°, a centimetre.
func lonLat(p Position) [2]float64 {
	return [2]float64{roundTo(p.Lon.Deg(), 1e7), roundTo(p.Lat.Deg(), 1e7)}
}

func pointOf(p Position, properties map[string]any) jsonFeature {
	return jsonFeature{"Feature", properties, jsonGeometry{"Point", lonLat(p)}}
}

// linePart is a part of the line between cuts, with lists as coordTimes has
// them: a value or null for each vertex, or for each leg.
type linePart struct {
	places   [][2]float64
	times    []any
	speeds   []any
	sailings []any
}

// lineFeature is the line sailed; of several parts where it is cut.
func (p *Passage) lineFeature() jsonFeature {
	parts := p.lineParts()
	f := jsonFeature{"Feature", map[string]any{"name": p.Name}, jsonGeometry{"LineString", parts[0].places}}
	times, speeds, sailings := any(parts[0].times), any(parts[0].speeds), any(parts[0].sailings)
	if len(parts) > 1 {
		var ps, ts, vs, ss []any
		for _, part := range parts {
			ps, ts, vs, ss = append(ps, part.places), append(ts, part.times), append(vs, part.speeds), append(ss, part.sailings)
		}
		f.Geometry = jsonGeometry{"MultiLineString", ps}
		times, speeds, sailings = ts, vs, ss
	}
	f.Properties["coordTimes"], f.Properties["speed_kn"], f.Properties["sailing"] = times, speeds, sailings
	return f
}

func (p *Passage) lineParts() []linePart {
	calls := p.calls()
	part := linePart{places: [][2]float64{lonLat(calls[0].Position)}, times: []any{stamp(calls[0].left)}}
	if calls[0].left.After(calls[0].reached) {
		part.times[0] = stamp(calls[0].reached)
	}
	var parts []linePart
	for i, c := range calls[1:] {
		from, to := calls[i].Position, c.Position
		var speed, sailing any
		if c.leg != nil {
			speed, sailing = roundTo(c.leg.SpeedKn, 1e4), c.leg.Sailing.String()
		}
		if lat, side, cut := cutAt(from, to); cut {
			part.add([2]float64{side, lat}, nil, speed, sailing)
			parts = append(parts, part)
			part = linePart{places: [][2]float64{{-side, lat}}, times: []any{nil}}
		}
		part.add(lonLat(to), stamp(c.reached), speed, sailing)
	}
	return append(parts, part)
}

func (l *linePart) add(place [2]float64, at, speed, sailing any) {
	l.places, l.times = append(l.places, place), append(l.times, at)
	l.speeds, l.sailings = append(l.speeds, speed), append(l.sailings, sailing)
}

// cutAt is the latitude at which the line between two places, straight in
// longitude and latitude, passes the antimeridian, and the side (180 or -180)
// on which it begins.
func cutAt(from, to Position) (lat, side float64, cut bool) {
	run := wrap(to.Lon - from.Lon).Deg()
	side = math.Copysign(180, run)
	to180 := side - from.Lon.Deg()
	if math.Abs(from.Lon.Deg()) == 180 || math.Abs(to.Lon.Deg()) == 180 || math.Abs(run) <= math.Abs(to180) {
		return 0, 0, false
	}
	return roundTo((from.Lat + (to.Lat - from.Lat).Mul(to180/run)).Deg(), 1e7), side, true
}
