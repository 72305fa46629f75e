package plan

import (
	"math"
	"sort"

	"github.com/soniakeys/unit"
)

// Sight is what a fix needs to know of a sight: the bearing of the body and
// the standard error of its altitude.
type Sight struct {
	Azimuth unit.Angle
	Error   unit.Angle // above 0
}

// Covariance is that of a fix, in NM², along north and east.
type Covariance struct{ NN, NE, EE float64 }

// Ellipse is the area that holds the fix with 95 % probability.
type Ellipse struct {
	SemiMajorNM, SemiMinorNM float64
	Axis                     unit.Angle // bearing of the major axis, [0°, 180°)
}

// chi95 is the 95 % point of χ² with two degrees of freedom.
const chi95 = 5.991

// information sums what sights tell of position and common error: the entries
// of Σ h hᵀ/s² with h = (cos Zn, sin Zn, 1) and s in minutes, which on the
// sea are nautical miles.
type information struct{ cc, cs, ss, c, s, w float64 }

func (g Sight) information() information {
	sin, cos := g.Azimuth.Sincos()
	w := 1 / (g.Error.Min() * g.Error.Min())
	return information{cos * cos * w, cos * sin * w, sin * sin * w, cos * w, sin * w, w}
}

func (a information) add(b information) information {
	return information{a.cc + b.cc, a.cs + b.cs, a.ss + b.ss, a.c + b.c, a.s + b.s, a.w + b.w}
}

// position is what is known of the position alone, the common error
// marginalised, times a factor that saves a division; and the determinant of
// that, 0 where the sights do not fix a position. weight is 1/s² of the common
// error's standard error s in minutes, +Inf where there is none.
func (a *information) position(weight float64) (cc, cs, ss, factor, det float64) {
	cc, cs, ss, factor = a.cc, a.cs, a.ss, 1
	if !math.IsInf(weight, 1) {
		factor = a.w + weight
		cc, cs, ss = a.cc*factor-a.c*a.c, a.cs*factor-a.c*a.s, a.ss*factor-a.s*a.s
	}
	det = cc*ss - cs*cs
	if w := a.w * factor; det <= 1e-12*w*w {
		det = 0
	}
	return cc, cs, ss, factor, det
}

// covariance is that of the position; where the sights do not fix one its
// entries are +Inf.
func (a *information) covariance(weight float64) Covariance {
	cc, cs, ss, f, det := a.position(weight)
	if det == 0 {
		return Covariance{math.Inf(1), 0, math.Inf(1)}
	}
	return Covariance{NN: ss * f / det, NE: -cs * f / det, EE: cc * f / det}
}

// square is the trace of the covariance: the expected error squared, in NM².
func (a *information) square(weight float64) float64 {
	cc, _, ss, f, det := a.position(weight)
	if det == 0 {
		return math.Inf(1)
	}
	return (cc + ss) * f / det
}

// commonWeight is 1/s² of a standard error in minutes; +Inf for none.
func commonWeight(s unit.Angle) float64 { return 1 / (s.Min() * s.Min()) }

// FixCovariance is the covariance of the fix from sights that share a common
// error (index, dip, the observer's own), by least squares:
//
//	altitude error = north cos Zn + east sin Zn + common + own
//
// The model is linear: good for a DR position within some 30 NM.
func FixCovariance(sights []Sight, common unit.Angle) Covariance {
	var sum information
	for _, g := range sights {
		sum = sum.add(g.information())
	}
	return sum.covariance(commonWeight(common))
}

// ExpectedError is the root mean square distance of the fix from the truth,
// in NM.
func (c Covariance) ExpectedError() float64 { return math.Sqrt(c.NN + c.EE) }

// Ellipse gives the 95 % ellipse.
func (c Covariance) Ellipse() Ellipse {
	mean, half := (c.NN+c.EE)/2, math.Hypot((c.NN-c.EE)/2, c.NE)
	axis := unit.Angle(math.Atan2(2*c.NE, c.NN-c.EE) / 2)
	if axis < 0 {
		axis += math.Pi
	}
	return Ellipse{
		SemiMajorNM: math.Sqrt(chi95 * (mean + half)),
		SemiMinorNM: math.Sqrt(chi95 * math.Max(mean-half, 0)),
		Axis:        axis,
	}
}

// Gaps gives the least and the greatest angle between neighbouring bearings
// round the horizon.
func Gaps(azimuths ...unit.Angle) (least, greatest unit.Angle) {
	sorted := append([]unit.Angle(nil), azimuths...)
	sort.Slice(sorted, func(i, j int) bool { return sorted[i] < sorted[j] })
	least = 2 * math.Pi
	for i := range sorted {
		gap := (sorted[(i+1)%len(sorted)] - sorted[i]).Mod1()
		if len(sorted) == 1 {
			gap = 2 * math.Pi
		}
		least, greatest = min(least, gap), max(greatest, gap)
	}
	return least, greatest
}
