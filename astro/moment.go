package astro

import (
	"math"
	"time"

	"gloam/astro/internal/vsop87"
)

// Moment holds what the places of all bodies share at one instant: the
// equator and the hour angle of date, the Earth's place and velocity. It is
// read-only once made, so one Moment serves many goroutines.
type Moment struct {
	frame
	earth    vector // heliocentric, AU, axes of the ICRS
	velocity vector // of the Earth, in units of the speed of light
}

// NewMoment prepares the instant t (UTC, taken as UT1) with ΔT = TT - UT1;
// [DeltaT] gives the usual one.
func NewMoment(t time.Time, deltaT time.Duration) *Moment {
	m := &Moment{frame: newFrame(t, deltaT)}
	place, velocity := vsop87.Earth.PlaceVelocity(m.tt / 365250)
	m.earth = fromEcliptic.apply(vector(place))
	m.velocity = fromEcliptic.apply(vector(velocity)).scale(lightDayPerAU)
	return m
}

// lightDayPerAU is the light time of one AU, in days (IAU 2012 B2 and c).
const lightDayPerAU = kmPerAU / 299792.458 / 86400

// fromEcliptic turns from the ecliptic and equinox of VSOP87 to the equator of
// FK5, which is that of the ICRS to 0.02" (Bretagnon & Francou 1988; the
// matrix stands in the theory's own notes, vsop87.doc, section 5).
var fromEcliptic = matrix{
	{1, 0.000000440360, -0.000000190919},
	{-0.000000479966, 0.917482137087, -0.397776982902},
	{0, 0.397776982902, 0.917482137087},
}

// apparent bends and shifts the direction of a body as the moving Earth sees
// it, and turns it to the true equator and equinox of date. From the Earth the
// body stands at p, from the Sun at q; both unit vectors.
func (m *Moment) apparent(p, q vector) vector {
	return m.npb.apply(m.aberrate(m.bend(p, q)))
}

// sunBending is twice the Sun's gravitational radius, in AU.
const sunBending = 1.97412574336e-8

// bend adds the Sun's deflection of light (Explanatory Supplement to the
// Astronomical Almanac, 3rd ed., eq. 7.63). The limit keeps it finite behind
// the Sun's disc.
func (m *Moment) bend(p, q vector) vector {
	r := m.earth.norm()
	e := m.earth.scale(1 / r)
	qe := math.Max(1+q.dot(e), 1e-5)
	return p.add(e.scale(p.dot(q)).sub(q.scale(e.dot(p))).scale(sunBending / r / qe)).unit()
}

// aberrate adds annual aberration (Explanatory Supplement, eq. 7.40).
func (m *Moment) aberrate(p vector) vector {
	v := m.velocity
	pv := p.dot(v)
	beta := math.Sqrt(1 - v.dot(v))
	return p.scale(beta).add(v.scale(1 + pv/(1+beta))).unit()
}
