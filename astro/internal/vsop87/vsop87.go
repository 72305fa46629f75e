// Package vsop87 evaluates the VSOP87B theory (Bretagnon & Francou, A&A 202,
// 309, 1988): heliocentric places of the planets referred to the ecliptic and
// equinox of J2000.
//
// The series are cut: terms below a limit are left out. Against the whole
// series the places of 1990-2100 keep within 0.0003' as seen from the Earth;
// gen prints the figures for each planet.
package vsop87

import (
	_ "embed"
	"encoding/binary"
	"math"
	"sync"
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

// Term is A cos(B + C τ), with τ in Julian millennia from J2000.
type Term struct{ A, B, C float64 }

// Series is the terms of each power of τ.
type Series [][]Term

// Theory is longitude (rad), latitude (rad) and distance (AU).
type Theory [3]Series

// Vector is a place (AU) or a velocity (AU per day) along the axes of the
// ecliptic and equinox of J2000.
type Vector [3]float64

var theories = sync.OnceValue(func() [count]Theory { return unpack(packed) })

// Place gives the heliocentric place at τ Julian millennia (TDB) from J2000.
func (p Planet) Place(tau float64) Vector {
	place, _ := theories()[p].PlaceVelocity(tau)
	return place
}

// PlaceVelocity gives the heliocentric place and velocity at τ.
func (p Planet) PlaceVelocity(tau float64) (place, velocity Vector) {
	return theories()[p].PlaceVelocity(tau)
}

// PlaceVelocity evaluates a theory and its rate at τ.
func (th Theory) PlaceVelocity(tau float64) (place, velocity Vector) {
	var v, d [3]float64
	for i := range th {
		v[i], d[i] = th[i].eval(tau)
	}
	sl, cl := math.Sincos(v[0])
	sb, cb := math.Sincos(v[1])
	r, dl, db, dr := v[2], d[0], d[1], d[2]
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

const daysPerMillennium = 365250

// eval gives the sum and its derivative by τ.
func (s Series) eval(tau float64) (sum, rate float64) {
	for k := len(s) - 1; k >= 0; k-- {
		var a, da float64
		for _, t := range s[k] {
			sin, cos := math.Sincos(t.B + t.C*tau)
			a += t.A * cos
			da -= t.A * t.C * sin
		}
		rate = sum + rate*tau + da
		sum = sum*tau + a
	}
	return sum, rate
}

// unpack reads the packed file: for each planet and coordinate the number of
// powers, then for each power the number of terms and the terms, all little
// endian: counts as uint16, numbers as float64.
func unpack(b []byte) (all [count]Theory) {
	short := func() int {
		n := binary.LittleEndian.Uint16(b)
		b = b[2:]
		return int(n)
	}
	float := func() float64 {
		x := math.Float64frombits(binary.LittleEndian.Uint64(b))
		b = b[8:]
		return x
	}
	for p := range all {
		for c := range all[p] {
			all[p][c] = make(Series, short())
			for k := range all[p][c] {
				terms := make([]Term, short())
				for i := range terms {
					terms[i] = Term{float(), float(), float()}
				}
				all[p][c][k] = terms
			}
		}
	}
	return all
}

// Pack writes theories in the form that the package embeds.
func Pack(all [count]Theory) []byte {
	var b []byte
	short := func(n int) { b = binary.LittleEndian.AppendUint16(b, uint16(n)) }
	for _, th := range all {
		for _, s := range th {
			short(len(s))
			for _, terms := range s {
				short(len(terms))
				for _, t := range terms {
					for _, x := range []float64{t.A, t.B, t.C} {
						b = binary.LittleEndian.AppendUint64(b, math.Float64bits(x))
					}
				}
			}
		}
	}
	return b
}
