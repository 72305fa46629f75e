package astro

import (
	"math"

	"github.com/soniakeys/unit"
)

// Elongation is the angle between the Sun and a body, [0°, 180°].
func Elongation(s Sky, b Body) unit.Angle { return s.Place(Sun).Separation(s.Place(b)) }

// BrightLimb tells which limb of the Moon, or of a planet, is lit towards the
// horizon of a position: [Lower] where the Sun stands on the lower side,
// [Upper] where on the upper. The lit side faces along the great circle to
// the Sun.
func BrightLimb(s Sky, b Body, lat, lon unit.Angle) Limb {
	hc, zn := s.Place(b).From(lat, lon)
	sunHc, sunZn := s.Place(Sun).From(lat, lon)
	dz := (sunZn - zn).Rad()
	// The Sun's direction along the upward vertical at the body.
	up := sin(sunHc.Rad())*cos(hc.Rad()) - cos(sunHc.Rad())*sin(hc.Rad())*math.Cos(dz)
	if up > 0 {
		return Upper
	}
	return Lower
}
