package astro

import (
	"math"
	"time"

	"github.com/soniakeys/meeus/v3/nutation"
	"github.com/soniakeys/unit"
)

// frame is the equator and the equinox of an instant, and how far the Earth
// has turned.
type frame struct {
	time  time.Time
	tt    float64 // days of TT since J2000
	npb   matrix  // ICRS to true equator and equinox of date
	gast  float64 // Greenwich apparent sidereal time, radians
	dpsi  float64 // nutation in longitude, radians
	obliq float64 // true obliquity, radians
}

func newFrame(t time.Time, deltaT time.Duration) frame {
	f := frame{time: t, tt: daysSinceJ2000(t.Add(deltaT))}
	dpsi, deps := nutation.Nutation(f.tt + 2451545)
	f.dpsi = dpsi.Rad()
	f.precess(f.tt/36525, deps.Rad())
	f.gast = siderealTime(daysSinceJ2000(t), f.tt/36525) + f.equinoxes()
	return f
}

// Time gives the instant.
func (f *frame) Time() time.Time { return f.time }

// equinoxes is the equation of the equinoxes, radians.
func (f *frame) equinoxes() float64 { return f.dpsi * cos(f.obliq) }

// precess fills npb and obliq: the IAU 2006 precession with frame bias in the
// four angles of Fukushima and Williams (Capitaine & Wallace, A&A 450, 855,
// 2006; IERS Conventions 2010, eq. 5.40), with nutation added.
func (f *frame) precess(t, deps float64) {
	gamma := arcsecond * (-0.052928 + t*(10.556378+t*(0.4932044+t*(-0.00031238+t*-0.000002788))))
	phi := arcsecond * (84381.412819 + t*(-46.811016+t*(0.0511268+t*(0.00053289+t*-0.000000440))))
	psi := arcsecond * (-0.041775 + t*(5038.481484+t*(1.5584175+t*(-0.00018522+t*-0.000026452))))
	mean := arcsecond * (84381.406 + t*(-46.836769+t*(-0.0001831+t*(0.00200340+t*-0.000000576))))
	f.obliq = mean + deps
	f.npb = rotX(-f.obliq).mul(rotZ(-psi - f.dpsi)).mul(rotX(phi)).mul(rotZ(gamma))
}

// siderealTime is Greenwich mean sidereal time in radians: the Earth rotation
// angle of UT1 and the accumulated precession of TT (IAU 2006; Capitaine,
// Wallace & Chapront, A&A 432, 355, 2005). ut in days, t in centuries of TT.
func siderealTime(ut, t float64) float64 {
	turn := 0.7790572732640 + 0.00273781191135448*ut + math.Mod(ut, 1)
	return 2*math.Pi*turn + arcsecond*(0.014506+t*(4612.156534+t*(1.3915817+t*(-0.00000044+t*-0.000029956))))
}

// place gives hour angle and declination of a direction on the true equator.
func (f *frame) place(direction vector) Place {
	ra, dec := direction.lonLat()
	return Place{GHA: circle(f.gast - ra), Dec: unit.Angle(dec), Illuminated: 1}
}
