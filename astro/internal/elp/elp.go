// Package elp evaluates the lunar theory ELP/MPP02 (Chapront & Francou, A&A
// 404, 735, 2003) with the constants fitted to the JPL ephemeris DE405:
// geocentric places of the Moon referred to the inertial mean ecliptic and
// equinox of J2000.
//
// The series are cut: terms below a limit are left out; gen prints how far
// that moves the Moon.
package elp

import (
	_ "embed"
	"encoding/binary"
	"math"
	"sync"
)

//go:generate go run ./gen -out elpmpp02.bin

//go:embed elpmpp02.bin
var packed []byte

// Degree is that of the polynomial in the phase of a term.
const Degree = 4

// Term is A sin(P0 + P1 t + ... + P4 t⁴), with t in Julian centuries from
// J2000.
type Term struct {
	A float64
	P [Degree + 1]float64
}

// Series is the terms of each power of t.
type Series [][]Term

// Theory is the mean longitude (rad, a polynomial in t) and the series of
// longitude and latitude (arcseconds) and distance (km).
type Theory struct {
	Mean   [Degree + 1]float64
	Series [3]Series
}

var theory = sync.OnceValue(func() *Theory { return unpack(packed) })

// Place gives the Moon's rectangular place in kilometres at t Julian centuries
// (TDB) from J2000.
func Place(t float64) [3]float64 { return theory().Place(t) }

// Distance gives the Moon's distance in kilometres alone.
func Distance(t float64) float64 { return theory().Series[2].eval(t) }

const arcsecond = math.Pi / 180 / 3600

// Place evaluates the theory at t.
func (th *Theory) Place(t float64) [3]float64 {
	lon := polynomial(th.Mean, t) + arcsecond*th.Series[0].eval(t)
	lat := arcsecond * th.Series[1].eval(t)
	r := th.Series[2].eval(t)
	sl, cl := math.Sincos(lon)
	sb, cb := math.Sincos(lat)
	return toJ2000(t, [3]float64{r * cb * cl, r * cb * sl, r * sb})
}

// toJ2000 turns from the mean ecliptic of date, on which the theory counts, to
// that of J2000, by Laskar's P and Q as the theory's authors give them.
func toJ2000(t float64, v [3]float64) [3]float64 {
	p := t * (0.10180391e-4 + t*(0.47020439e-6+t*(-0.5417367e-9+t*(-0.2507948e-11+t*0.463486e-14))))
	q := t * (-0.113469002e-3 + t*(0.12372674e-6+t*(0.12654170e-8+t*(-0.1371808e-11+t*-0.320334e-14))))
	s := math.Sqrt(1 - p*p - q*q)
	x, y, z := v[0], v[1], v[2]
	return [3]float64{
		(1-2*p*p)*x + 2*p*q*y + 2*p*s*z,
		2*p*q*x + (1-2*q*q)*y - 2*q*s*z,
		-2*p*s*x + 2*q*s*y + (1-2*p*p-2*q*q)*z,
	}
}

func polynomial(c [Degree + 1]float64, t float64) float64 {
	return c[0] + t*(c[1]+t*(c[2]+t*(c[3]+t*c[4])))
}

func (s Series) eval(t float64) (sum float64) {
	for k := len(s) - 1; k >= 0; k-- {
		a := 0.0
		for i := range s[k] {
			a += s[k][i].A * math.Sin(polynomial(s[k][i].P, t))
		}
		sum = sum*t + a
	}
	return sum
}

// unpack reads the packed file: the mean longitude, then for each series the
// number of powers, and for each power the number of terms and the terms, all
// little endian: counts as uint16, numbers as float64.
func unpack(b []byte) *Theory {
	th := &Theory{}
	float := func() float64 {
		x := math.Float64frombits(binary.LittleEndian.Uint64(b))
		b = b[8:]
		return x
	}
	short := func() int {
		n := binary.LittleEndian.Uint16(b)
		b = b[2:]
		return int(n)
	}
	floats := func() (c [Degree + 1]float64) {
		for i := range c {
			c[i] = float()
		}
		return c
	}
	th.Mean = floats()
	for c := range th.Series {
		th.Series[c] = make(Series, short())
		for k := range th.Series[c] {
			terms := make([]Term, short())
			for i := range terms {
				terms[i] = Term{float(), floats()}
			}
			th.Series[c][k] = terms
		}
	}
	return th
}

// Pack writes a theory in the form that the package embeds.
func Pack(th Theory) []byte {
	var b []byte
	short := func(n int) { b = binary.LittleEndian.AppendUint16(b, uint16(n)) }
	floats := func(c ...float64) {
		for _, x := range c {
			b = binary.LittleEndian.AppendUint64(b, math.Float64bits(x))
		}
	}
	floats(th.Mean[:]...)
	for _, s := range th.Series {
		short(len(s))
		for _, terms := range s {
			short(len(terms))
			for _, t := range terms {
				floats(t.A)
				floats(t.P[:]...)
			}
		}
	}
	return b
}
