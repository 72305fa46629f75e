package track

import (
	"fmt"
	"math"

	"github.com/soniakeys/unit"
)

// MaxLatitude is the greatest latitude a waypoint may have. Nearer the pole
// longitude, and with it course and ship's time, loses its meaning.
var MaxLatitude = unit.AngleFromDeg(89.9)

// repeatNM is the distance under which two vertices count as one place: 1 m.
const repeatNM = 1 / mileM

// Waypoint is a named place on a route; the name may be empty.
type Waypoint struct {
	Name string
	Position
	Timing
}

// Label names the waypoint, or gives its position where it has no name.
func (w Waypoint) Label() string {
	if w.Name != "" {
		return w.Name
	}
	return w.Position.String()
}

// Route is a line to sail and what its file says of how. SpeedKn and Sailing
// are for the legs whose waypoints say nothing; they and EyeM are zero where
// the file is silent.
type Route struct {
	Name      string
	Waypoints []Waypoint // two or more, neighbours differ
	SpeedKn   float64
	Sailing   *Sailing
	EyeM      float64
	Notes     []string // what the reader passed over, in words
}

// newRoute checks the vertices, drops those that repeat their neighbour, and
// thins what is left where it is much. drawn is how many points the file has.
func newRoute(vertices []Waypoint, drawn int) (*Route, error) {
	r := &Route{}
	for i, w := range vertices {
		if err := checkLatitude(vertexPlace(i), w.Position); err != nil {
			return nil, err
		}
		if n := len(r.Waypoints); n > 0 && near(r.Waypoints[n-1].Position, w.Position, repeatNM) {
			if !w.timed() {
				r.Notes = append(r.Notes, fmt.Sprintf("%s repeats the one before it and is skipped", vertexPlace(i)))
			}
			r.Waypoints[n-1].absorb(&w)
			continue
		}
		r.Waypoints = append(r.Waypoints, w)
	}
	r.Notes = fewNotes(r.Notes)
	if len(r.Waypoints) > thinnedOver {
		r.Waypoints = thin(r.Waypoints)
	}
	if drawn > thinnedOver {
		r.Notes = append(r.Notes, fmt.Sprintf("%d points are thinned to %d, none of them over %v NM off", drawn, len(r.Waypoints), ThinnedNM))
	}
	if n := len(r.Waypoints); n > maxWaypoints {
		return nil, tooMany(maxWaypoints)
	}
	if len(r.Waypoints) < 2 {
		return nil, &Error{
			Place: "line", Met: fmt.Sprintf("%d point(s), all at one place", len(vertices)),
			Allowed: "two or more different ones", Hint: "draw the route as a line from departure to arrival",
		}
	}
	return r, nil
}

// fewNotes keeps the first notes of many.
func fewNotes(notes []string) []string {
	const few = 3
	if more := len(notes) - few; more > 1 {
		return append(notes[:few], fmt.Sprintf("and so do %d more points", more))
	}
	return notes
}

// checkLatitude refuses a place too near a pole.
func checkLatitude(place string, p Position) error {
	if math.Abs(p.Lat.Rad()) <= MaxLatitude.Rad() {
		return nil
	}
	return &Error{
		Place:   place,
		Met:     fmt.Sprintf("latitude %.4f°", p.Lat.Deg()),
		Allowed: fmt.Sprintf("-%[1]v° to %[1]v°: at a pole neither course nor ship's time is defined", MaxLatitude.Deg()),
		Hint:    "keep a few miles short of the pole",
	}
}

func vertexPlace(i int) string { return fmt.Sprintf("point %d of the line", i+1) }

// near tells whether two places lie within nm nautical miles.
func near(a, b Position, nm float64) bool {
	if math.Abs((a.Lat - b.Lat).Min()) > 2*nm+1e-9 {
		return false
	}
	// East-west likewise, on the smaller parallel, whose arc is at most π/2 times
	// the distance, even across a pole.
	parallel := math.Min(a.Lat.Cos(), b.Lat.Cos())
	if math.Abs(wrap(a.Lon-b.Lon).Min())*parallel > 2*nm+1e-9 {
		return false
	}
	leg := NewLeg(Waypoint{Position: a}, Waypoint{Position: b}, GreatCircle)
	return leg.DistanceNM <= nm
}
