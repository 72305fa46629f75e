package astro

import (
	"math"
	"time"

	"github.com/soniakeys/meeus/v3/nutation"
	"github.com/soniakeys/unit"

	"gloam/astro/internal/vsop87"
)

// Moment holds what the places of all bodies share at one instant: the Earth's
// place and velocity, precession, nutation and sidereal time. It is read-only
// once made, so one Moment serves many goroutines.
type Moment struct {
	time     time.Time
	tt       float64 // days of TT since J2000
	earth    vector  // heliocentric, AU, axes of the ICRS
	velocity vector  // of the Earth, in units of the speed of light
	npb      matrix  // ICRS to true equator and equinox of date
	gast     float64 // Greenwich apparent sidereal time, radians
	dpsi     float64 // nutation in longitude, radians
	obliq    float64 // true obliquity, radians
}

// NewMoment prepares the instant t (UTC, taken as UT1) with ΔT = TT - UT1;
// [DeltaT] gives the usual one.
func NewMoment(t time.Time, deltaT time.Duration) *Moment {
	m := &Moment{time: t, tt: daysSinceJ2000(t.Add(deltaT))}
	place, velocity := vsop87.Earth.PlaceVelocity(m.tt / 365250)
	m.earth = fromEcliptic.apply(vector(place))
	m.velocity = fromEcliptic.apply(vector(velocity)).scale(lightDayPerAU)

	dpsi, deps := nutation.Nutation(m.tt + 2451545)
	m.dpsi = dpsi.Rad()
	m.precess(m.tt/36525, deps.Rad())
	m.gast = siderealTime(daysSinceJ2000(t), m.tt/36525) + m.dpsi*cos(m.obliq)
	return m
}

// Time gives the instant.
func (m *Moment) Time() time.Time { return m.time }

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

// precess fills npb and obliq: the IAU 2006 precession with frame bias in the
// four angles of Fukushima and Williams (Capitaine & Wallace, A&A 450, 855,
// 2006; IERS Conventions 2010, eq. 5.40), with nutation added.
func (m *Moment) precess(t, deps float64) {
	gamma := arcsecond * (-0.052928 + t*(10.556378+t*(0.4932044+t*(-0.00031238+t*-0.000002788))))
	phi := arcsecond * (84381.412819 + t*(-46.811016+t*(0.0511268+t*(0.00053289+t*-0.000000440))))
	psi := arcsecond * (-0.041775 + t*(5038.481484+t*(1.5584175+t*(-0.00018522+t*-0.000026452))))
	mean := arcsecond * (84381.406 + t*(-46.836769+t*(-0.0001831+t*(0.00200340+t*-0.000000576))))
	m.obliq = mean + deps
	m.npb = rotX(-m.obliq).mul(rotZ(-psi - m.dpsi)).mul(rotX(phi)).mul(rotZ(gamma))
}

// siderealTime is Greenwich mean sidereal time in radians: the Earth rotation
// angle of UT1 and the accumulated precession of TT (IAU 2006; Capitaine,
// Wallace & Chapront, A&A 432, 355, 2005). ut in days, t in centuries of TT.
func siderealTime(ut, t float64) float64 {
	turn := 0.7790572732640 + 0.00273781191135448*ut + math.Mod(ut, 1)
	return 2*math.Pi*turn + arcsecond*(0.014506+t*(4612.156534+t*(1.3915817+t*(-0.00000044+t*-0.000029956))))
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

// hourAngle is the GHA of a right ascension, in [0°, 360°).
func (m *Moment) hourAngle(ra float64) unit.Angle { return circle(m.gast - ra) }
