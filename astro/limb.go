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

// fullDefect is by how much a limb may fall short of the full disc and still be
// taken: the tenth of a minute to which altitudes are worked.
var fullDefect = unit.AngleFromMin(0.1)

// EitherLimb tells whether the Moon's upper and lower limb both stand full, to
// 0.1': the lit side reaches so far round that the terminator, half an ellipse
// of axes SD and SD (2k - 1) for a lit part k, falls short of the dark one by no
// more.
func EitherLimb(s Sky, lat, lon unit.Angle) bool {
	moon := s.Place(Moon)
	hc, zn := moon.From(lat, lon)
	sunHc, sunZn := s.Place(Sun).From(lat, lon)
	dz := (sunZn - zn).Rad()
	up := sin(sunHc.Rad())*cos(hc.Rad()) - cos(sunHc.Rad())*sin(hc.Rad())*cos(dz)
	aside := cos(sunHc.Rad()) * sin(dz)
	towards := math.Abs(up) / math.Hypot(up, aside) // cosine of the lit side's angle from the vertical
	short := 2*moon.Illuminated - 1
	if short <= 0 {
		return false
	}
	reach := 1 / math.Sqrt(towards*towards/(short*short)+(1-towards*towards))
	return moon.SD.Mul(1-reach) <= fullDefect
}
