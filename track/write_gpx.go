package track

import (
	"encoding/xml"
	"io"
)

// The GPX 1.1 elements that are written, in the order of its schema.
type (
	gpxFile struct {
		XMLName xml.Name   `xml:"http://www.topografix.com/GPX/1/1 gpx"`
		Version string     `xml:"version,attr"`
		Creator string     `xml:"creator,attr"`
		Points  []gpxPoint `xml:"wpt"`
		Route   gpxRoute   `xml:"rte"`
	}
	gpxRoute struct {
		Name   string     `xml:"name,omitempty"`
		Points []gpxPoint `xml:"rtept"`
	}
	gpxPoint struct {
		Lat  float64 `xml:"lat,attr"`
		Lon  float64 `xml:"lon,attr"`
		Time string  `xml:"time,omitempty"`
		Name string  `xml:"name,omitempty"`
		Desc string  `xml:"desc,omitempty"`
		Type string  `xml:"type,omitempty"`
	}
)

// WriteGPX writes the passage as GPX 1.1: a route with the time at each
// waypoint, twice where the ship stays, and the marks as waypoints.
func WriteGPX(w io.Writer, p *Passage, marks []Mark) error {
	file := gpxFile{Version: "1.1", Creator: "gloam", Route: gpxRoute{Name: p.Name}}
	for _, m := range marks {
		point := gpxAt(m.Position)
		point.Time, point.Name, point.Desc, point.Type = stamp(m.Time), m.Title, m.Text, m.Kind
		file.Points = append(file.Points, point)
	}
	for _, c := range p.calls() {
		point := gpxAt(c.Position)
		point.Name, point.Time = c.Name, stamp(c.reached)
		file.Route.Points = append(file.Route.Points, point)
		if c.left.After(c.reached) {
			point.Time = stamp(c.left)
			file.Route.Points = append(file.Route.Points, point)
		}
	}
	if _, err := io.WriteString(w, xml.Header); err != nil {
		return err
	}
	enc := xml.NewEncoder(w)
	enc.Indent("", " ")
	if err := enc.Encode(file); err != nil {
		return err
	}
	_, err := io.WriteString(w, "\n")
	return err
}

// gpxAt is a point with longitude in [-180, 180), as the schema wants it.
func gpxAt(p Position) gpxPoint {
	at := lonLat(p)
	if at[0] == 180 {
		at[0] = -180
	}
	return gpxPoint{Lat: at[1], Lon: at[0]}
}
