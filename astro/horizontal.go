package astro

import (
	"math"

	"github.com/soniakeys/unit"
)

// AltAz gives computed altitude Hc, [-90°, 90°], and azimuth Zn, clockwise
// from true north, [0°, 360°), of a geocentric place seen from latitude (north
// positive) and longitude (east positive). Straight overhead or at a pole the
// azimuth is any.
func AltAz(gha, dec, lat, lon unit.Angle) (hc, zn unit.Angle) {
	sd, cd := dec.Sincos()
	sl, cl := lat.Sincos()
	sh, ch := (gha + lon).Sincos()
	north := sd*cl - cd*sl*ch
	west := cd * sh
	up := sd*sl + cd*cl*ch
	return unit.Angle(math.Atan2(up, math.Hypot(north, west))), circle(math.Atan2(-west, north))
}

// From gives computed altitude and azimuth of the place; see [AltAz].
func (p Place) From(lat, lon unit.Angle) (hc, zn unit.Angle) {
	return AltAz(p.GHA, p.Dec, lat, lon)
}

// Separation is the angle between two places, [0°, 180°].
func (p Place) Separation(q Place) unit.Angle {
	hc, _ := AltAz(p.GHA, p.Dec, q.Dec, -q.GHA)
	return unit.Angle(math.Pi/2) - hc
}
