package track

import (
	"encoding/xml"
	"fmt"
	"io"
	"strings"
)

var gpxRoot = xmlRoot{"gpx", []string{"http://www.topografix.com/GPX/1/1", "http://www.topografix.com/GPX/1/0"}, readGPX}

// ReadGPX reads a route from GPX 1.1 or 1.0: its one route (rte), or where it
// has none its one track (trk), the segments joined. The time of a point is the
// time the ship reaches it; the same place twice with two times is a stay.
// Other elements are passed over. Errors are of type *[Error], but for those of
// r.
func ReadGPX(r io.Reader) (*Route, error) { return readXML(limited(r), gpxRoot) }

// gpxLine is a route or track of the file.
type gpxLine struct {
	name     string
	points   gathered
	segments int
}

func readGPX(x *xmlReader, _ xml.StartElement) (*Route, error) {
	var title string
	var routes, tracks []gpxLine
	err := x.each(func(e xml.StartElement) (err error) {
		switch e.Name.Local {
		case "rte":
			return x.gpxLine(&routes, "rtept")
		case "trk":
			return x.gpxLine(&tracks, "trkpt")
		case "metadata":
			return x.each(func(e xml.StartElement) (err error) {
				if e.Name.Local != "name" {
					return x.skip()
				}
				title, err = x.text()
				return err
			})
		case "name": // of GPX 1.0
			title, err = x.text()
			return err
		}
		return x.skip()
	})
	if err != nil {
		return nil, err
	}
	return x.chooseLine(title, routes, tracks)
}

// gpxLine reads a route, or a track with its segments.
func (x *xmlReader) gpxLine(lines *[]gpxLine, point string) error {
	*lines = append(*lines, gpxLine{})
	l := &(*lines)[len(*lines)-1]
	var inside func(e xml.StartElement) error
	inside = func(e xml.StartElement) (err error) {
		switch e.Name.Local {
		case "name":
			l.name, err = x.text()
			return err
		case point:
			w, err := x.gpxPoint(e)
			l.points.add(w)
			return err
		case "trkseg":
			l.segments++
			return x.each(inside)
		}
		return x.skip()
	}
	return x.each(inside)
}

func (x *xmlReader) gpxPoint(e xml.StartElement) (w Waypoint, err error) {
	if w.Position, err = x.position(e); err != nil {
		return w, err
	}
	point := e.Name.Local
	return w, x.each(func(e xml.StartElement) error {
		if e.Name.Local != "name" && e.Name.Local != "time" {
			return x.skip()
		}
		text, err := x.text()
		if err != nil {
			return err
		}
		if e.Name.Local == "name" {
			w.Name = printable(text)
		} else if text != "" {
			w.ETA, err = x.instant(point+" time", text)
		}
		return err
	})
}

// chooseLine takes the one route, or the one track.
func (x *xmlReader) chooseLine(title string, routes, tracks []gpxLine) (*Route, error) {
	lines, what := routes, "route"
	if len(routes) == 0 {
		lines, what = tracks, "track"
	}
	if len(lines) == 0 {
		return nil, &Error{"file", "no route and no track", "one route (rte) or track (trk)", "export the route as GPX"}
	}
	if len(lines) > 1 {
		var names []string
		for i, l := range lines {
			names = append(names, fmt.Sprintf("%d %q", i+1, shorten(l.name)))
		}
		return nil, &Error{"file", shorten(fmt.Sprintf("%d %ss: %s", len(lines), what, strings.Join(names, ", "))), "one " + what, "export the " + what + " to be sailed alone"}
	}
	l := lines[0]
	r, err := newRoute(l.points.line(), l.points.count)
	if err != nil {
		return nil, err
	}
	if r.Name = printable(l.name); r.Name == "" {
		r.Name = printable(title)
	}
	if what == "route" && len(tracks) > 0 {
		x.notes = append(x.notes, "the file's track is passed over: it has a route")
	}
	if l.segments > 1 {
		x.notes = append(x.notes, fmt.Sprintf("the track's %d segments are joined", l.segments))
	}
	return r, nil
}
