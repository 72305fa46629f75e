package astro

import "math"

// sunMagnitude is the Sun's visual magnitude at one AU (Willmer, ApJS 236, 47,
// 2018).
const sunMagnitude = -26.76

// planetMagnitude is the visual magnitude of a planet one AU from Sun and
// Earth, at a phase angle in degrees, seen in a direction (unit vector, ICRS).
// Mallama & Hilton, Astronomy and Computing 25, 10 (2018), eqs. 3-12, without
// the turning of Mars, which changes its light by under 0.08.
func planetMagnitude(b Body, phase float64, direction vector) float64 {
	switch b {
	case Venus:
		if phase > 163.7 {
			return 236.05828 + phase*(-2.81914+phase*8.39034e-3)
		}
		return -4.384 + phase*(-1.044e-3+phase*(3.687e-4+phase*(-2.814e-6+phase*8.938e-9)))
	case Mars:
		if phase > 50 {
			return -0.367 + phase*(-0.02573+phase*0.0003445)
		}
		return -1.601 + phase*(0.02267-phase*0.0001302)
	case Jupiter:
		return -9.395 + phase*(-3.7e-4+phase*6.16e-4)
	}
	tilt := math.Abs(saturnPole.dot(direction)) // sine of the rings' opening
	return -8.914 - 1.825*tilt + 0.026*phase - 0.378*tilt*math.Exp(-2.25*phase)
}

// saturnPole is the direction of Saturn's north pole in the ICRS: RA 40.589°,
// Dec 83.537° (IAU WGCCRE 2015).
var saturnPole = spherical(40.589*degree, 83.537*degree)

// moonMagnitude is the Moon's visual magnitude at a phase angle in degrees and
// a distance in kilometres (Allen, Astrophysical Quantities, 3rd ed., 1973,
// in the form of Krisciunas & Schaefer, PASP 103, 1033, 1991). Beyond a phase
// angle of 150°, a thin crescent, it makes the Moon too bright by 0.5 or more.
func moonMagnitude(phase, km float64) float64 {
	return -12.73 + 0.026*phase + 4e-9*math.Pow(phase, 4) + 5*math.Log10(km/meanMoonKm)
}

// meanMoonKm is the Moon's mean distance.
const meanMoonKm = 384400
