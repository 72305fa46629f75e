// Package magnetic gives the Earth's magnetic field at sea by the World Magnetic
// Model 2025 (NOAA and BGS, public domain), from 2025 to 2030.
package magnetic

import (
	_ "embed"
	"fmt"
	"math"
	"strings"
	"sync"
	"time"

	"github.com/soniakeys/unit"
)

//go:generate go run ./gen

// Span of years in which the model holds.
const (
	FirstYear = 2025.0
	LastYear  = 2030.0
)

// Weak is the horizontal field, in nT, below which a compass cannot be trusted
// (the model's own blackout zone).
const Weak = 2000.0

// Field is the magnetic field at a place.
type Field struct {
	North, East, Down float64 // nT
}

// Horizontal is the strength of the horizontal field, nT.
func (f Field) Horizontal() float64 { return math.Hypot(f.North, f.East) }

// Variation is the angle from true to magnetic north, east positive.
func (f Field) Variation() unit.Angle { return unit.Angle(math.Atan2(f.East, f.North)) }

// Holds tells whether the model holds at an instant.
func Holds(t time.Time) bool { y := year(t); return y >= FirstYear && y < LastYear }

// year is an instant as a year with decimals.
func year(t time.Time) float64 {
	t = t.UTC()
	begin := time.Date(t.Year(), 1, 1, 0, 0, 0, 0, time.UTC)
	return float64(t.Year()) + t.Sub(begin).Hours()/begin.AddDate(1, 0, 0).Sub(begin).Hours()
}

// At gives the field at sea level. Outside the years in which the model holds
// it goes on as if the field changed as before.
func At(lat, lon unit.Angle, t time.Time) Field { return at(lat.Rad(), lon.Rad(), 0, year(t)) }

const (
	degrees   = 12
	terms     = (degrees + 1) * (degrees + 2) / 2
	reference = 6371.2 // km, the model's sphere
	equator   = 6378.137
	ecc2      = 0.00669437999014132 // WGS84
)

// coefficient is g and h of a degree and order, nT, and their change in a year.
type coefficient struct{ g, h, dg, dh float64 }

// index is where degree n, order m stand.
func index(n, m int) int { return n*(n+1)/2 + m }

//go:embed wmm2025.txt
var table string

// model reads the table: lines of n, m, g, h, dg, dh.
var model = sync.OnceValue(func() *[terms]coefficient {
	var c [terms]coefficient
	for l := range strings.Lines(table) {
		var n, m int
		var x coefficient
		if _, err := fmt.Sscan(l, &n, &m, &x.g, &x.h, &x.dg, &x.dh); err != nil {
			panic("magnetic: the table built in is damaged: " + err.Error())
		}
		c[index(n, m)] = x
	}
	return &c
})

// at sums the model at a geodetic latitude and longitude (radians), a height
// above the ellipsoid (km) and a year: the model's technical report, equations
// 7 to 17.
func at(lat, lon, heightKm, year float64) Field {
	// Geocentric latitude and radius.
	sin, cos := math.Sincos(lat)
	normal := equator / math.Sqrt(1-ecc2*sin*sin)
	p, z := (normal+heightKm)*cos, (normal*(1-ecc2)+heightKm)*sin
	r := math.Hypot(p, z)
	sinC, cosC := z/r, math.Max(p/r, 1e-10) // the pole itself has no east

	model := model()
	legendre, slope := legendre(sinC, cosC)
	var north, east, down float64
	for n := 1; n <= degrees; n++ {
		scale := math.Pow(reference/r, float64(n+2))
		for m := 0; m <= n; m++ {
			i := index(n, m)
			c := &model[i]
			g, h := c.g+(year-FirstYear)*c.dg, c.h+(year-FirstYear)*c.dh
			s, co := math.Sincos(float64(m) * lon)
			north -= scale * (g*co + h*s) * slope[i]
			east += scale * float64(m) * (g*s - h*co) * legendre[i] / cosC
			down -= scale * float64(n+1) * (g*co + h*s) * legendre[i]
		}
	}
	// Turned from the geocentric to the geodetic horizon.
	turn := math.Atan2(sinC, cosC) - lat
	st, ct := math.Sincos(turn)
	return Field{North: north*ct - down*st, East: east, Down: north*st + down*ct}
}

// legendre gives the Schmidt semi-normalised associated Legendre functions of
// the sine of latitude, and their derivatives by latitude.
func legendre(sin, cos float64) (p, slope [terms]float64) {
	p[0] = 1
	for n := 1; n <= degrees; n++ {
		for m := 0; m <= n; m++ {
			i := index(n, m)
			if n == m {
				k := 1.0
				if n > 1 {
					k = math.Sqrt(1 - 1/(2*float64(n)))
				}
				j := index(n-1, n-1)
				p[i], slope[i] = k*cos*p[j], k*(cos*slope[j]-sin*p[j])
				continue
			}
			root := math.Sqrt(float64(n*n - m*m))
			a := float64(2*n-1) / root
			j := index(n-1, m)
			p[i], slope[i] = a*sin*p[j], a*(sin*slope[j]+cos*p[j])
			if m < n-1 {
				b := math.Sqrt(float64((n-1)*(n-1)-m*m)) / root
				k := index(n-2, m)
				p[i], slope[i] = p[i]-b*p[k], slope[i]-b*slope[k]
			}
		}
	}
	return p, slope
}
