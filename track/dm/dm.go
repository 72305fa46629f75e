// Package dm writes angles the way navigators do: whole degrees, minutes and
// tenths, latitude with two figures of degrees, longitude with three.
//
// Every function rounds once and carries: 59.96' becomes the next degree and
// 00.0', never 60.0'.
package dm

import (
	"fmt"
	"math"

	"github.com/soniakeys/unit"
)

// Lat writes a latitude in [-90°, 90°], north positive: 49° 12.4' N.
func Lat(a unit.Angle) string { return hemisphere(a, 2, 'N', 'S') }

// Lon writes a longitude in [-180°, 180°], east positive: 012° 30.0' W.
func Lon(a unit.Angle) string { return hemisphere(a, 3, 'E', 'W') }

// Position writes latitude and longitude: 49° 12.4' N 012° 30.0' W.
func Position(lat, lon unit.Angle) string { return Lat(lat) + " " + Lon(lon) }

// Altitude writes an angle with two figures of degrees: 41° 07.3'. An angle
// below zero carries a minus sign.
func Altitude(a unit.Angle) string {
	sign, d, m := split(a)
	return fmt.Sprintf("%s%02d° %s'", sign, d, m)
}

// Bearing writes a direction to the nearest degree in three figures: 063°.
func Bearing(a unit.Angle) string {
	return fmt.Sprintf("%03d°", int(math.Round(a.Mod1().Deg()))%360)
}

// Course writes a direction to a tenth of a degree in three figures: 063.4°.
func Course(a unit.Angle) string {
	tenths := int(math.Round(a.Mod1().Deg()*10)) % 3600
	return fmt.Sprintf("%03d.%d°", tenths/10, tenths%10)
}

func hemisphere(a unit.Angle, width int, pos, neg rune) string {
	sign, d, m := split(a)
	name := pos
	if sign == "-" {
		name = neg
	}
	return fmt.Sprintf("%0*d° %s' %c", width, d, m, name)
}

// split rounds a to a tenth of a minute and takes it apart; an angle that
// rounds to zero has no sign.
func split(a unit.Angle) (sign string, deg int, min string) {
	tenths := int(math.Round(math.Abs(a.Min()) * 10))
	if a < 0 && tenths > 0 {
		sign = "-"
	}
	return sign, tenths / 600, fmt.Sprintf("%02d.%d", tenths%600/10, tenths%10)
}
