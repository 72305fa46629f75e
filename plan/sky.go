package plan

import (
	"math"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// sky is the Sun and the Moon as they stand over the moving ship.
type sky struct {
	passage   *track.Passage
	ephemeris *astro.Ephemeris
	bends     []float64                 // per leg: see legBend
	sun       map[unit.Angle][]crossing // of the altitudes searched so far
}

func newSky(p *track.Passage, deltaT func(time.Time) time.Duration) *sky {
	// A day more at either end, for ship's days that the passage cuts.
	const margin = 24 * time.Hour
	s := &sky{passage: p, sun: map[unit.Angle][]crossing{}, ephemeris: astro.NewEphemeris(p.Departure.Add(-margin), p.Arrival.Add(margin), deltaT)}
	for i := range p.Legs {
		s.bends = append(s.bends, legBend(&p.Legs[i]))
	}
	return s
}

// place gives a body's place and its altitude from the ship.
func (s *sky) place(b astro.Body, t time.Time) (p astro.Place, hc, zn unit.Angle) {
	fix := s.passage.At(t)
	p = s.ephemeris.Place(b, t)
	hc, zn = p.From(fix.Lat, fix.Lon)
	return p, hc, zn
}

func (s *sky) altitude(b astro.Body, t time.Time) unit.Angle {
	_, hc, _ := s.place(b, t)
	return hc
}

// above is how far a body stands above the altitude given, as a difference of
// sines, which bends less than the altitude itself.
func (s *sky) above(b astro.Body, level func(astro.Place) unit.Angle) func(time.Time) float64 {
	return func(t time.Time) float64 {
		p, hc, _ := s.place(b, t)
		return hc.Sin() - level(p).Sin()
	}
}

// fixed is a level that does not depend on the body's place.
func fixed(level unit.Angle) func(astro.Place) unit.Angle {
	return func(astro.Place) unit.Angle { return level }
}

// crossings searches the passage leg by leg: at a waypoint the ship's course,
// and so the slope of f, jumps.
func (s *sky) crossings(f func(time.Time) float64) []crossing {
	var all []crossing
	for i := range s.passage.Legs {
		leg := &s.passage.Legs[i]
		all = append(all, crossings(f, leg.ETD, leg.ETA, s.bends[i])...)
	}
	return all
}

// sunCrossings gives when the Sun crosses an altitude, searched once for each.
func (s *sky) sunCrossings(level unit.Angle) []crossing {
	if _, done := s.sun[level]; !done {
		s.sun[level] = s.crossings(s.above(astro.Sun, fixed(level)))
	}
	return s.sun[level]
}

const (
	// skyRate bounds how fast Sun or Moon turn over a place at rest: 15.05° an
	// hour and the motion of their own, in radians an hour, with room.
	skyRate = 0.28
	// radianPerMile is the ship's greatest turn of the vertical, radians per
	// nautical mile: the meridian is most curved at the equator, 1852 m in
	// 6335 km.
	radianPerMile = 1.852 / 6335
)

// legBend bounds the second derivative by time, per hour squared, of the sine
// of a body's altitude and of what meridian passage searches. Both are a
// product of the unit vectors to the zenith and to the body (and the fixed
// axis), so the bound is (a + v)² + v² tan φ, where a is the body's rate, v
// the rate at which the zenith turns, and v² tan φ the bend of a rhumb line at
// latitude φ. A great circle has no such bend.
func legBend(leg *track.Leg) float64 {
	v := leg.SpeedKn * radianPerMile
	bend := (skyRate + v) * (skyRate + v)
	if leg.Sailing == track.Rhumb {
		bend += v * v * math.Max(math.Abs(leg.From.Lat.Tan()), math.Abs(leg.To.Lat.Tan()))
	}
	return bend
}
