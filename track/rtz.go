package track

import (
	"encoding/xml"
	"fmt"
	"io"
	"slices"
)

var rtzRoot = xmlRoot{"route", []string{"http://www.cirm.org/RTZ/1/0", "http://www.cirm.org/RTZ/1/1", "http://www.cirm.org/RTZ/1/2"}, readRTZ}

// ReadRTZ reads a route in the route exchange format of IEC 61174, RTZ 1.0 to
// 1.2: waypoints, the geometry of the legs, and of its schedules the first
// manual one, or where there is none the first calculated one, with times,
// stays and speeds. Loxodrome is a rhumb line, Orthodrome a great circle; legs
// that say nothing follow the default waypoint, or are rhumb lines. Errors are
// of type *[Error], but for those of r.
func ReadRTZ(r io.Reader) (*Route, error) { return readXML(limited(r), rtzRoot) }

// rtzFile is the file as read.
type rtzFile struct {
	name      string
	points    []Waypoint
	index     map[string]int // into points, by the waypoint's id
	usual     *Sailing       // the default waypoint's
	schedules []rtzSchedule
}

func readRTZ(x *xmlReader, root xml.StartElement) (*Route, error) {
	if version, _ := attribute(root, "version"); !slices.Contains([]string{"1.0", "1.1", "1.2"}, version) {
		return nil, x.refuse("route attribute version", fmt.Sprintf("%q", shorten(version)), "1.0, 1.1 or 1.2")
	}
	f := &rtzFile{index: map[string]int{}}
	err := x.each(func(e xml.StartElement) error {
		switch e.Name.Local {
		case "routeInfo":
			name, _ := attribute(e, "routeName")
			f.name = printable(name)
		case "waypoints":
			return x.each(func(e xml.StartElement) error { return f.waypoint(x, e) })
		case "schedules":
			return x.each(func(e xml.StartElement) error { return f.schedule(x, e) })
		}
		return x.skip()
	})
	if err != nil {
		return nil, err
	}
	return f.route(x)
}

// waypoint reads a waypoint, or the default one. The leg of a waypoint is the
// one that ends there.
func (f *rtzFile) waypoint(x *xmlReader, e xml.StartElement) error {
	if e.Name.Local != "waypoint" && e.Name.Local != "defaultWaypoint" {
		return x.skip()
	}
	name, _ := attribute(e, "name")
	id, hasID := attribute(e, "id")
	w, placed := Waypoint{Name: printable(name)}, false
	err := x.each(func(e xml.StartElement) (err error) {
		switch e.Name.Local {
		case "position":
			placed = true
			if w.Position, err = x.position(e); err != nil {
				return err
			}
		case "leg":
			if w.Sailing, err = x.geometry(e); err != nil {
				return err
			}
		}
		return x.skip()
	})
	switch {
	case err != nil:
		return err
	case e.Name.Local == "defaultWaypoint":
		f.usual = w.Sailing
		return nil
	case !hasID:
		return x.refuse("waypoint attribute id", "missing", "a number of its own")
	case f.has(id):
		return x.refuse("waypoint attribute id", shorten(id)+", for the second time", "a number of its own")
	case !placed:
		return x.refuse("waypoint "+shorten(id), "no position", "a position")
	case len(f.points) > maxWaypoints:
		return tooMany(maxWaypoints)
	}
	f.index[id] = len(f.points)
	f.points = append(f.points, w)
	return nil
}

func (f *rtzFile) has(id string) bool {
	_, known := f.index[id]
	return known
}

func (x *xmlReader) geometry(leg xml.StartElement) (*Sailing, error) {
	text, ok := attribute(leg, "geometryType")
	s, known := map[string]Sailing{"Loxodrome": Rhumb, "Orthodrome": GreatCircle}[text]
	switch {
	case !ok:
		return nil, nil
	case !known:
		return nil, x.refuse("leg attribute geometryType", fmt.Sprintf("%q", shorten(text)), "Loxodrome or Orthodrome")
	}
	return &s, nil
}

// route puts the schedule chosen to the waypoints.
func (f *rtzFile) route(x *xmlReader) (*Route, error) {
	if err := f.apply(x); err != nil {
		return nil, err
	}
	if len(f.points) > 0 {
		f.points[0].Sailing = nil // no leg ends there
	}
	unsaid := 0
	for i := 1; i < len(f.points); i++ {
		if f.points[i].Sailing == nil {
			unsaid++
		}
	}
	if unsaid > 0 && f.usual == nil {
		x.notes = append(x.notes, fmt.Sprintf("%d leg(s) without a geometry are sailed as rhumb lines", unsaid))
	}
	if len(f.points) < 2 {
		return nil, &Error{"file", fmt.Sprintf("%d waypoint(s)", len(f.points)), "two or more", "export the route from departure to arrival"}
	}
	r, err := newRoute(f.points, len(f.points))
	if err != nil {
		return nil, err
	}
	r.Name, r.Sailing = f.name, f.usual
	return r, nil
}
