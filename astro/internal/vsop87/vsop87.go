// Package vsop87 evaluates the VSOP87B theory (Bretagnon & Francou, A&A 202,
// 309, 1988): heliocentric places of the planets referred to the ecliptic and
// equinox of J2000.
//
// The series are cut: terms below a limit are left out. Against the whole
// series the places of 1990-2100 keep within 0.0012' as seen from the Earth;
// gen prints the figures for each planet.
package vsop87

import (
	_ "embed"
	"math"
	"sync"

	"gloam/astro/internal/series"
)

//go:generate go run ./gen -out vsop87b.bin

//go:embed vsop87b.bin
var packed []byte

// Planet is one of the planets held here.
type Planet int

// The planets, in the order of the packed file.
const (
	Earth Planet = iota
	Venus
	Mars
	Jupiter
	Saturn
	count
)

// Names are the planets' names as the source files spell them.
var Names = [count]string{"earth", "venus", "mars", "jupiter", "saturn"}

// Theory is the series of longitude (rad), latitude (rad) and distance (AU) by
// τ, Julian millennia from J2000.
type Theory [3]series.Series

// Theories holds every planet's theory.
type Theories [count]Theory

// Vector is a place (AU) or a velocity (AU per day) along the axes of the
// ecliptic and equinox of J2000.
type Vector [3]float64

var theories = sync.OnceValue(func() *Theories { return unpack(packed) })

// PlaceVelocity gives the heliocentric place and velocity at τ Julian
// millennia (TDB) from J2000.
func (p Planet) PlaceVelocity(tau float64) (place, velocity Vector) {
	return theories()[p].PlaceVelocity(tau)
}

const daysPerMillennium = 365250

// PlaceVelocity evaluates a theory and its rate at τ.
func (th *Theory) PlaceVelocity(tau float64) (place, velocity Vector) {
	l, dl := th[0].SumRate(tau)
	b, db := th[1].SumRate(tau)
	r, dr := th[2].SumRate(tau)
	sl, cl := math.Sincos(l)
	sb, cb := math.Sincos(b)
	place = Vector{r * cb * cl, r * cb * sl, r * sb}
	velocity = Vector{
		dr*cb*cl - r*sb*cl*db - r*cb*sl*dl,
		dr*cb*sl - r*sb*sl*db + r*cb*cl*dl,
		dr*sb + r*cb*db,
	}
	for i := range velocity {
		velocity[i] /= daysPerMillennium
	}
	return place, velocity
}

// unpack reads the packed file: the three series of each planet in turn.
func unpack(b series.Packed) *Theories {
	var all Theories
	for p := range all {
		for c := range all[p] {
			all[p][c] = b.Series()
		}
	}
	return &all
}

// Pack writes theories in the form that the package embeds.
func (all *Theories) Pack() []byte {
	var b series.Packed
	for _, th := range all {
		for _, s := range th {
			b.PutSeries(s)
		}
	}
	return b
}
