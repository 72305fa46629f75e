package astro

import (
	"math"

	"github.com/soniakeys/unit"
)

// Elongation is the angle between the Sun and a body, [0°, 180°].
func Elongation(s Sky, b Body) unit.Angle { return s.Place(Sun).Separation(s.Place(b)) }

// sunward is the direction from the Moon, or a planet, to the Sun as seen from a
// position: how far up, and how far to the right, of a vector whose length is
// the sine of the angle between the two.
func sunward(s Sky, b Body, lat, lon unit.Angle) (up, right float64) {
	hc, zn := s.Place(b).From(lat, lon)
	sunHc, sunZn := s.Place(Sun).From(lat, lon)
	dz := (sunZn - zn).Rad()
	up = sin(sunHc.Rad())*cos(hc.Rad()) - cos(sunHc.Rad())*sin(hc.Rad())*cos(dz)
	return up, cos(sunHc.Rad()) * sin(dz)
}

// BrightLimb tells which limb of the Moon, or of a planet, is lit towards the
// horizon of a position: [Lower] where the Sun stands on the lower side,
// [Upper] where on the upper. The lit side faces along the great circle to
// the Sun.
func BrightLimb(s Sky, b Body, lat, lon unit.Angle) Limb {
	if up, _ := sunward(s, b, lat, lon); up > 0 {
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
	up, right := sunward(s, Moon, lat, lon)
	moon := s.Place(Moon)
	short := 2*moon.Illuminated - 1
	if short <= 0 {
		return false
	}
	towards := math.Abs(up) / math.Hypot(up, right) // cosine of the lit side's angle from the vertical
	reach := 1 / math.Sqrt(towards*towards/(short*short)+(1-towards*towards))
	return moon.SD.Mul(1-reach) <= fullDefect
}

// LitSide is the direction of the middle of the Moon's lit edge as it stands in
// the sky of a position: clockwise from straight up, [0°, 360°).
func LitSide(s Sky, lat, lon unit.Angle) unit.Angle {
	up, right := sunward(s, Moon, lat, lon)
	return circle(math.Atan2(right, up))
}
