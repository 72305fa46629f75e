// Package astro tells where the Sun, the Moon, the planets and the stars stand
// and what a sextant shows of them. It knows no ships.
//
// [NewMoment] prepares what all bodies share at one instant; [Moment.Place]
// gives a body's apparent geocentric place (GHA, Dec, HP, SD, magnitude).
// [Place.From] turns it to altitude and azimuth at a position, and [Sextant]
// joins altitudes computed and altitudes measured.
//
// Planets and Sun follow VSOP87B, with light time, the Sun's bending of light,
// annual aberration, IAU 2006 precession and nutation. The Moon follows
// ELP/MPP02. Stars come from the Hipparcos catalogue. Valid 1990 to 2100; see the README for the accuracy measured.
//
// Instants are UTC taken as UT1: the difference is under 0.9 s, under 0.23'
// of GHA.
package astro
