package astro

import (
	"math"

	"github.com/soniakeys/unit"
)

const (
	degree    = math.Pi / 180
	arcsecond = degree / 3600
	mas       = arcsecond / 1000
)

func sin(x float64) float64 { return math.Sin(x) }
func cos(x float64) float64 { return math.Cos(x) }

// vector is a place or direction along rectangular axes.
type vector [3]float64

// spherical is the unit vector of longitude (or RA) and latitude (or Dec).
func spherical(lon, lat float64) vector {
	sl, cl := math.Sincos(lon)
	sb, cb := math.Sincos(lat)
	return vector{cb * cl, cb * sl, sb}
}

func (v vector) add(w vector) vector { return vector{v[0] + w[0], v[1] + w[1], v[2] + w[2]} }
func (v vector) sub(w vector) vector { return v.add(w.scale(-1)) }
func (v vector) scale(f float64) vector {
	return vector{v[0] * f, v[1] * f, v[2] * f}
}
func (v vector) dot(w vector) float64 {
	return float64(v[0]*w[0]) + float64(v[1]*w[1]) + float64(v[2]*w[2])
}
func (v vector) norm() float64 { return math.Sqrt(v.dot(v)) }
func (v vector) unit() vector  { return v.scale(1 / v.norm()) }

// lonLat is the inverse of spherical for a vector of any length.
func (v vector) lonLat() (lon, lat float64) {
	return math.Atan2(v[1], v[0]), math.Atan2(v[2], math.Hypot(v[0], v[1]))
}

// matrix turns vectors from one set of axes to another.
type matrix [3]vector

func (m matrix) apply(v vector) vector {
	return vector{m[0].dot(v), m[1].dot(v), m[2].dot(v)}
}

// mul is the rotation n followed by the rotation m.
func (m matrix) mul(n matrix) (p matrix) {
	for i := range p {
		for j := range p[i] {
			p[i][j] = m[i].dot(vector{n[0][j], n[1][j], n[2][j]})
		}
	}
	return p
}

// rotX and rotZ turn the axes by a about the first and the third axis.
func rotX(a float64) matrix {
	s, c := math.Sincos(a)
	return matrix{{1, 0, 0}, {0, c, s}, {0, -s, c}}
}

func rotZ(a float64) matrix {
	s, c := math.Sincos(a)
	return matrix{{c, s, 0}, {-s, c, 0}, {0, 0, 1}}
}

// circle brings an angle into [0°, 360°); a turn by floating point remainder
// can end on 360° itself.
func circle(a float64) unit.Angle {
	if c := unit.Angle(a).Mod1(); c < 2*math.Pi {
		return c
	}
	return 0
}

// angle is that between two unit vectors, [0, π].
func (v vector) angle(w vector) float64 {
	return 2 * math.Asin(math.Min(v.sub(w).norm()/2, 1))
}
