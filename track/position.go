package track

import (
	"math"

	"github.com/soniakeys/unit"

	"gloam/track/dm"
)

// Position is a place on the WGS84 ellipsoid: geodetic latitude, north
// positive, [-90°, 90°]; longitude, east positive, (-180°, 180°].
type Position struct {
	Lat, Lon unit.Angle
}

// PositionFromDeg makes a Position from degrees; the longitude may be any
// number and is brought into (-180°, 180°].
func PositionFromDeg(lat, lon float64) Position {
	return Position{unit.AngleFromDeg(lat), unit.AngleFromDeg(wrapDeg(lon))}
}

// String writes the position as 49° 12.4' N 012° 30.0' W.
func (p Position) String() string { return dm.Position(p.Lat, p.Lon) }

// wrapDeg brings an angle in degrees into (-180, 180].
func wrapDeg(d float64) float64 {
	d = math.Remainder(d, 360)
	if d <= -180 {
		d += 360
	}
	return d
}

// wrap brings an angle into (-180°, 180°].
func wrap(a unit.Angle) unit.Angle {
	r := math.Remainder(a.Rad(), 2*math.Pi)
	if r <= -math.Pi {
		r += 2 * math.Pi
	}
	return unit.Angle(r)
}

// turn brings an angle into [0°, 360°): also one so little below zero that
// adding a full turn rounds to 360°.
func turn(a unit.Angle) unit.Angle {
	if a = a.Mod1(); a.Rad() < 2*math.Pi {
		return a
	}
	return 0
}
