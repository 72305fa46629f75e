package track

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"sort"

	"github.com/paulmach/orb"
	"github.com/soniakeys/unit"
)

// vertex is a waypoint as the file draws it, with the longitude it has there.
type vertex struct {
	Waypoint
	lon float64
}

// waypoints turns the line into waypoints with longitudes in (-180°, 180°],
// with the times and speeds of its properties and the names of points on it.
func (f *feature) waypoints(points []feature) ([]Waypoint, error) {
	parts := f.parts()
	if err := f.readTimings(parts); err != nil {
		return nil, err
	}
	if err := callAt(parts, points); err != nil {
		return nil, err
	}
	line, err := f.join(parts)
	if err != nil {
		return nil, err
	}
	if err := f.checkLongitudes(line); err != nil {
		return nil, err
	}
	waypoints := make([]Waypoint, len(line))
	for i, v := range line {
		waypoints[i] = v.Waypoint
	}
	return waypoints, nil
}

// parts are the line's parts: one for a LineString.
func (f *feature) parts() [][]vertex {
	lines, many := f.geometry.(orb.MultiLineString)
	if !many {
		lines = orb.MultiLineString{f.geometry.(orb.LineString)}
	}
	parts := make([][]vertex, len(lines))
	for i, line := range lines {
		for _, p := range line {
			parts[i] = append(parts[i], vertex{Waypoint{Position: PositionFromDeg(p.Lat(), p.Lon())}, p.Lon()})
		}
	}
	return parts
}

// callAt gives each vertex the name and the stay of the first Point with a name
// that lies on it.
func callAt(parts [][]vertex, points []feature) error {
	if len(points) > maxWaypoints {
		return &Error{"file", fmt.Sprintf("%d points", len(points)), fmt.Sprintf("at most %d beside the line", maxWaypoints), "keep the points that name waypoints"}
	}
	var byLat []*vertex
	for _, part := range parts {
		for i := range part {
			byLat = append(byLat, &part[i])
		}
	}
	slices.SortStableFunc(byLat, func(a, b *vertex) int { return cmp.Compare(a.Lat, b.Lat) })
	for _, f := range points {
		call, err := f.call()
		if err != nil {
			return err
		}
		if call.Name != "" {
			call.nameNear(byLat)
		}
	}
	return nil
}

// nameNear gives a waypoint's name and stay to the unnamed vertices close to
// it. They come in order of latitude.
func (w *Waypoint) nameNear(byLat []*vertex) {
	reach := unit.AngleFromMin(2 * waypointNM)
	first := sort.Search(len(byLat), func(i int) bool { return byLat[i].Lat >= w.Lat-reach })
	for _, v := range byLat[first:] {
		if v.Lat > w.Lat+reach {
			return
		}
		if v.Name == "" && near(v.Position, w.Position, waypointNM) {
			v.Name, v.Stay = w.Name, w.Stay
		}
	}
}

// checkLongitudes lets a longitude pass ±180° only where the line runs there
// from inside the range by steps of less than half a turn: a plain crossing.
func (f *feature) checkLongitudes(line []vertex) error {
	inside := false
	for _, v := range line {
		inside = inside || math.Abs(v.lon) <= 180
	}
	for i, v := range line {
		if math.Abs(v.lon) <= 180 {
			continue
		}
		plain := inside && (i == 0 || math.Abs(v.lon-line[i-1].lon) < 180) &&
			(i == len(line)-1 || math.Abs(v.lon-line[i+1].lon) < 180)
		if !plain {
			return longitudeError(fmt.Sprintf("%s point %d", f.place, i+1), v.lon)
		}
	}
	return nil
}

// join puts the parts of a line cut at the antimeridian together again. The
// cut's own vertex is dropped where the cut made it, not the sailor: where it
// has neither name nor time, the legs on either side are sailed alike, and it
// lies on the straight line, in longitude and latitude, between its neighbours.
func (f *feature) join(parts [][]vertex) ([]vertex, error) {
	if len(parts) == 0 {
		return nil, &Error{f.place, "no parts", "one or more", "draw the route as one line"}
	}
	line := slices.Clone(parts[0])
	for i, next := range parts[1:] {
		cut, again := &line[len(line)-1], &next[0]
		if !onCut(cut.lon, again.lon) || math.Abs((cut.Lat-again.Lat).Deg()) > 1e-6 {
			return nil, &Error{
				fmt.Sprintf("%s part %d", f.place, i+2), "a second line, apart from the first",
				"parts that meet at longitude 180 and -180 on one latitude (RFC 7946, 3.1.9)", "draw the route as one line",
			}
		}
		if again.timed() && !cut.timed() {
			cut.ETA, cut.ETD, cut.Stay = again.ETA, again.ETD, again.Stay
		}
		if cut.silent(&next[1].Timing) && straight(&line[len(line)-2], cut, &next[1]) {
			line = line[:len(line)-1]
		}
		line = append(line, next[1:]...)
	}
	return line, nil
}

// onCut tells whether two longitudes are 180° and -180°, to 0.1 m.
func onCut(a, b float64) bool {
	return math.Abs(math.Abs(a)-180) < 1e-6 && math.Abs(a+b) < 2e-6
}

// silent tells whether a vertex says nothing of its own, and the leg that ends
// there is sailed as the one that ends at the next.
func (v *vertex) silent(next *Timing) bool {
	sameSailing := v.Sailing == next.Sailing || v.Sailing != nil && next.Sailing != nil && *v.Sailing == *next.Sailing
	return v.Name == "" && !v.timed() && v.Stay == 0 && v.SpeedKn == next.SpeedKn && sameSailing
}

// straight tells whether the cut vertex lies within 0.1' of the straight line
// between its neighbours, longitudes taken as running on across ±180°. Where
// they lie half a turn or more apart the vertex stays: without it the leg would
// go the other way round.
func straight(a, cut, b *vertex) bool {
	before, after := wrapDeg(cut.lon-a.lon), wrapDeg(b.lon-cut.lon)
	run := before + after
	if run == 0 || math.Abs(run) >= 180 {
		return false
	}
	onLine := a.Lat + (b.Lat - a.Lat).Mul(before/run)
	return math.Abs((onLine - cut.Lat).Min()) < 0.1
}
