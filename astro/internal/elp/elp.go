// Package elp evaluates the lunar theory ELP/MPP02 (Chapront & Francou, A&A
// 404, 735, 2003) with the constants fitted to the JPL ephemeris DE405:
// geocentric places of the Moon referred to the inertial mean ecliptic and
// equinox of J2000.
//
// The series are cut: terms below a limit are left out, and only large terms
// keep what bends their phase. Against the whole series the places of
// 1990-2100 keep within 0.0024'; gen prints the figure.
package elp

import (
	_ "embed"
	"math"
	"sync"

	"gloam/astro/internal/series"
)

//go:generate go run ./gen -out elpmpp02.bin

//go:embed elpmpp02.bin
var packed []byte

// Polynomial is c0 + c1 t + ... + c4 t⁴.
type Polynomial [5]float64

// At evaluates the polynomial.
func (c *Polynomial) At(t float64) float64 {
	return c[0] + t*(c[1]+t*(c[2]+t*(c[3]+t*c[4])))
}

// Bent is a term A cos(phase) whose phase is a polynomial in t.
type Bent struct {
	A     float64
	Phase Polynomial
}

// Coordinate is the sum of terms with bent and with straight phases.
type Coordinate struct {
	Bent     []Bent
	Straight series.Series
}

func (c *Coordinate) sum(t float64) float64 {
	sum := c.Straight.Sum(t)
	for i := range c.Bent {
		sum += c.Bent[i].A * math.Cos(c.Bent[i].Phase.At(t))
	}
	return sum
}

// Theory is the mean longitude (rad) and the series of longitude and latitude
// (arcseconds) and distance (km) by t, Julian centuries from J2000.
type Theory struct {
	Mean        Polynomial
	Coordinates [3]Coordinate
}

var theory = sync.OnceValue(func() *Theory { return unpack(packed) })

// Place gives the Moon's rectangular place in kilometres at t Julian centuries
// (TDB) from J2000.
func Place(t float64) [3]float64 { return theory().Place(t) }

// Distance gives the Moon's distance in kilometres alone.
func Distance(t float64) float64 { return theory().Coordinates[2].sum(t) }

const arcsecond = math.Pi / 180 / 3600

// Place evaluates the theory at t.
func (th *Theory) Place(t float64) [3]float64 {
	lon := th.Mean.At(t) + arcsecond*th.Coordinates[0].sum(t)
	lat := arcsecond * th.Coordinates[1].sum(t)
	r := th.Coordinates[2].sum(t)
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

// unpack reads the packed file: the mean longitude, then for each coordinate
// the count of bent terms, these, and the straight series.
func unpack(b series.Packed) *Theory {
	th := &Theory{}
	b.Floats(th.Mean[:])
	for i := range th.Coordinates {
		c := &th.Coordinates[i]
		c.Bent = make([]Bent, b.Count())
		for j := range c.Bent {
			var a [1]float64
			b.Floats(a[:])
			c.Bent[j].A = a[0]
			b.Floats(c.Bent[j].Phase[:])
		}
		c.Straight = b.Series()
	}
	return th
}

// Pack writes a theory in the form that the package embeds.
func (th *Theory) Pack() []byte {
	var b series.Packed
	b.PutFloats(th.Mean[:]...)
	for _, c := range th.Coordinates {
		b.PutCount(len(c.Bent))
		for _, x := range c.Bent {
			b.PutFloats(x.A)
			b.PutFloats(x.Phase[:]...)
		}
		b.PutSeries(c.Straight)
	}
	return b
}
