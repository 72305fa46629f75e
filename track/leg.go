package track

import (
	"fmt"
	"math"
	"time"

	"github.com/soniakeys/unit"
	"github.com/tidwall/geodesic"
)

// Sailing is the line a ship keeps between two waypoints.
type Sailing int

// The sailings.
const (
	Rhumb       Sailing = iota // rhumb line: one course all along
	GreatCircle                // geodesic: the shortest way, course changing
)

// String gives the name that [ParseSailing] reads.
func (s Sailing) String() string {
	if s == GreatCircle {
		return "great-circle"
	}
	return "rhumb"
}

// ParseSailing reads "rhumb" or "great-circle".
func ParseSailing(name string) (Sailing, error) {
	for _, s := range []Sailing{Rhumb, GreatCircle} {
		if name == s.String() {
			return s, nil
		}
	}
	return 0, fmt.Errorf("sailing %q (rhumb or great-circle)", name)
}

// Leg is the way between two waypoints. Make one with [NewLeg].
type Leg struct {
	From, To   Waypoint
	Sailing    Sailing
	Course     unit.Angle // true course at From, [0°, 360°)
	DistanceNM float64
	SpeedKn    float64       // these three are set by [Route.Sail]
	ETD, ETA   time.Time     // UTC
	line       geodesic.Line // great circle only
}

// Stays tells whether the ship lies still on the leg.
func (l *Leg) Stays() bool { return l.SpeedKn == 0 }

// lasts is how long the leg takes at its speed; longer than any passage may
// last it counts as 800 days.
func (l *Leg) lasts() time.Duration {
	return hoursToDuration(math.Min(l.DistanceNM/l.SpeedKn, 2*MaxDuration.Hours()))
}

// NewLeg works out course and distance from one waypoint to the next, the
// shorter way round the Earth. Agrees with GeographicLib's RhumbSolve and
// GeodSolve to a millimetre.
func NewLeg(from, to Waypoint, s Sailing) Leg {
	leg := Leg{From: from, To: to, Sailing: s}
	if s == Rhumb {
		leg.Course, leg.DistanceNM = rhumb(from.Position, to.Position)
		return leg
	}
	leg.line = geodesic.WGS84.InverseLine(equatorDeg(from.Lat), from.Lon.Deg(), equatorDeg(to.Lat), to.Lon.Deg(), 0)
	leg.Course = turn(unit.AngleFromDeg(leg.line.Azi1()))
	leg.DistanceNM = leg.line.S13() / mileM
	return leg
}

// equatorDeg is a latitude in degrees, exactly 0 for one within 1e-12° (0.1 µm)
// of the equator. With a minus zero there, the geodesic package gives negative
// distances between nearly antipodal points.
func equatorDeg(lat unit.Angle) float64 {
	if math.Abs(lat.Deg()) < 1e-12 {
		return 0
	}
	return lat.Deg()
}

// At gives position and true course nm nautical miles along the leg, nm in
// [0, DistanceNM].
func (l *Leg) At(nm float64) (Position, unit.Angle) {
	if l.Sailing == Rhumb {
		return rhumbDirect(l.From.Position, l.Course, nm), l.Course
	}
	var lat, lon, course float64
	l.line.Position(nm*mileM, &lat, &lon, &course)
	return PositionFromDeg(lat, lon), turn(unit.AngleFromDeg(course))
}
