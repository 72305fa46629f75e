package astro

import (
	"math"

	"github.com/soniakeys/unit"

	"gloam/astro/internal/vsop87"
)

// Place is a body's apparent geocentric place and look.
type Place struct {
	GHA         unit.Angle // Greenwich hour angle, westward, [0°, 360°)
	Dec         unit.Angle // declination, north positive, [-90°, 90°]
	HP          unit.Angle // horizontal parallax at the equator; 0 for stars
	SD          unit.Angle // geocentric semidiameter; 0 for stars
	Magnitude   float64    // visual; 0 for Aries
	Illuminated float64    // lit part of the disc, 0 to 1; 1 for Sun and stars
}

// kmPerAU is IAU 2012 B2; equatorAU is the Earth's equatorial radius in AU.
const (
	kmPerAU   = 149597870.7
	equatorAU = 6378.137 / kmPerAU
)

// Semidiameters at one AU (Sun: Auwers, as in Meeus ch. 55; planets: mean
// radii of IAU WGCCRE 2015), and the Moon's as a part of its parallax.
var semidiameters = [...]float64{
	Sun: 959.63 * arcsecond, Venus: 8.344 * arcsecond, Mars: 4.683 * arcsecond,
	Jupiter: 96.39 * arcsecond, Saturn: 80.29 * arcsecond,
}

// Place gives the apparent place of a body. For Aries only GHA and Dec mean
// anything. Accuracy, 2000-2049, as measured against the JPL ephemeris DE431:
// see the README.
func (m *Moment) Place(b Body) Place {
	switch b.Class() {
	case ClassPoint:
		return Place{GHA: circle(m.gast)}
	case ClassMoon:
		return m.moon().litBy(m.sun())
	case ClassStar:
		return m.star(&catalogue()[b-firstStar])
	case ClassSun:
		return m.sun()
	}
	return m.planet(b)
}

func (m *Moment) sun() Place {
	r := m.earth.norm()
	p := m.place(m.npb.apply(m.aberrate(m.earth.scale(-1 / r))))
	p.HP, p.SD = parallax(r), unit.Angle(semidiameters[Sun]/r)
	p.Magnitude = sunMagnitude + 5*math.Log10(r)
	return p
}

func (m *Moment) planet(b Body) Place {
	sun, earth, distance := m.heliocentric(b)
	p := m.place(m.apparent(earth, sun.unit()))
	p.HP, p.SD = parallax(distance), unit.Angle(semidiameters[b]/distance)
	r, phase := sun.norm(), math.Acos(sun.unit().dot(earth))
	p.Illuminated = (1 + cos(phase)) / 2
	p.Magnitude = planetMagnitude(b, phase/degree, earth) + 5*math.Log10(r*distance)
	return p
}

var theories = [...]vsop87.Planet{Venus: vsop87.Venus, Mars: vsop87.Mars, Jupiter: vsop87.Jupiter, Saturn: vsop87.Saturn}

// heliocentric gives a planet's place from the Sun when the light left it
// (AU), its direction from the Earth, and its distance from the Earth (AU).
// Over the light time the planet is taken to move straight on, which for these
// four is true to 2 km.
func (m *Moment) heliocentric(b Body) (sun, earth vector, distance float64) {
	place, velocity := theories[b].PlaceVelocity(m.tt / 365250)
	now, speed := fromEcliptic.apply(vector(place)), fromEcliptic.apply(vector(velocity))
	sun = now
	for range 2 {
		distance = sun.sub(m.earth).norm()
		sun = now.sub(speed.scale(distance * lightDayPerAU))
	}
	return sun, sun.sub(m.earth).unit(), distance
}

func (m *Moment) star(s *star) Place {
	direction := s.place.add(s.motion.scale(m.tt / 365.25)).sub(m.earth.scale(s.parallax)).unit()
	p := m.place(m.apparent(direction, direction))
	p.Magnitude = s.magnitude
	return p
}

func parallax(distance float64) unit.Angle { return unit.Angle(math.Asin(equatorAU / distance)) }
