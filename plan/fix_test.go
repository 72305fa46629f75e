package plan

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/soniakeys/unit"
	"pgregory.net/rapid"
)

func sightsAt(error float64, azimuths ...float64) []Sight {
	var all []Sight
	for _, a := range azimuths {
		all = append(all, Sight{unit.AngleFromDeg(a), unit.AngleFromMin(error)})
	}
	return all
}

// Closed forms of the small-angle model with common error marginalised, worked
// by hand: spacing by 120° and by 60° tie without a common error (2/√3) and
// part with one (1.155, 1.633 NM); n sights evenly spaced reach the floor
// 2 s/√n; two at right angles with a common error give √(s1² + s2² + 2 b²).
func TestExpectedErrorClosedForms(t *testing.T) {
	even := func(n int) (a []float64) {
		for i := range n {
			a = append(a, 360*float64(i)/float64(n))
		}
		return a
	}
	for _, c := range []struct {
		name     string
		own      float64
		common   float64
		azimuths []float64
		want     float64
	}{
		{"120° apart, no common error", 1, 0, []float64{0, 120, 240}, 2 / math.Sqrt(3)},
		{"60° apart, no common error", 1, 0, []float64{0, 60, 120}, 2 / math.Sqrt(3)},
		{"120° apart", 1, 1, []float64{0, 120, 240}, 2 / math.Sqrt(3)},
		{"60° apart", 1, 1, []float64{0, 60, 120}, math.Sqrt(8.0 / 3)},
		{"four evenly spaced", 0.5, 0.5, even(4), 2 * 0.5 / math.Sqrt(4)},
		{"seven evenly spaced", 0.5, 2, even(7), 2 * 0.5 / math.Sqrt(7)},
		{"two at right angles", 1, 1, []float64{10, 100}, 2},
	} {
		got := FixCovariance(sightsAt(c.own, c.azimuths...), unit.AngleFromMin(c.common)).ExpectedError()
		if math.Abs(got-c.want) > 1e-9 {
			t.Errorf("%s: %.6f NM, want %.6f", c.name, got, c.want)
		}
	}
}

func TestFixWithoutCross(t *testing.T) {
	for name, sights := range map[string][]Sight{
		"none": nil, "one": sightsAt(1, 30), "two on one bearing": sightsAt(1, 30, 30),
		"reciprocal": sightsAt(1, 30, 210),
	} {
		if e := FixCovariance(sights, unit.AngleFromMin(0.5)).ExpectedError(); !math.IsInf(e, 1) {
			t.Errorf("%s: expected error %v, want +Inf", name, e)
		}
	}
}

// Simulated sights with the model's errors, solved by least squares for
// position and common error, spread as predicted: within 3 % of the expected
// error with 40,000 rounds, whose own scatter is 0.4 %.
func TestCovarianceByMonteCarlo(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	const common = 0.7
	sights := []Sight{
		{unit.AngleFromDeg(20), unit.AngleFromMin(0.5)},
		{unit.AngleFromDeg(95), unit.AngleFromMin(0.8)},
		{unit.AngleFromDeg(170), unit.AngleFromMin(0.6)},
	}
	want := FixCovariance(sights, unit.AngleFromMin(common))
	// Weighted normal equations for north, east and common error, solved by
	// Cramer's rule: nothing shared with the code under test.
	var n [3][3]float64
	h := make([][3]float64, len(sights))
	for i, g := range sights {
		h[i] = [3]float64{g.Azimuth.Cos(), g.Azimuth.Sin(), 1}
		for r := range 3 {
			for c := range 3 {
				n[r][c] += h[i][r] * h[i][c] / math.Pow(g.Error.Min(), 2)
			}
		}
	}
	n[2][2] += 1 / (common * common)
	const rounds = 40000
	var nn, ee, ne float64
	for range rounds {
		var rhs [3]float64
		b := rng.NormFloat64() * common
		for i, g := range sights {
			a := b + rng.NormFloat64()*g.Error.Min()
			for r := range 3 {
				rhs[r] += h[i][r] * a / math.Pow(g.Error.Min(), 2)
			}
		}
		x := [2]float64{det3(swap(n, rhs, 0)) / det3(n), det3(swap(n, rhs, 1)) / det3(n)}
		nn, ee, ne = nn+x[0]*x[0], ee+x[1]*x[1], ne+x[0]*x[1]
	}
	got := Covariance{nn / rounds, ne / rounds, ee / rounds}
	for name, pair := range map[string][2]float64{
		"expected error": {got.ExpectedError(), want.ExpectedError()},
		"semi-major":     {got.Ellipse().SemiMajorNM, want.Ellipse().SemiMajorNM},
		"semi-minor":     {got.Ellipse().SemiMinorNM, want.Ellipse().SemiMinorNM},
	} {
		if math.Abs(pair[0]/pair[1]-1) > 0.03 {
			t.Errorf("%s: %.4f NM simulated, %.4f predicted", name, pair[0], pair[1])
		}
	}
}

func det3(m [3][3]float64) float64 {
	return m[0][0]*(m[1][1]*m[2][2]-m[1][2]*m[2][1]) - m[0][1]*(m[1][0]*m[2][2]-m[1][2]*m[2][0]) + m[0][2]*(m[1][0]*m[2][1]-m[1][1]*m[2][0])
}

func swap(m [3][3]float64, column [3]float64, c int) [3][3]float64 {
	for r := range m {
		m[r][c] = column[r]
	}
	return m
}

// The ellipse of a long error along 030° points there, 95 % being 2.4477
// standard errors along an axis (√5.991).
func TestEllipse(t *testing.T) {
	s, c := unit.AngleFromDeg(30).Sincos()
	cov := Covariance{NN: 4*c*c + s*s, NE: 3 * s * c, EE: 4*s*s + c*c}
	e := cov.Ellipse()
	if math.Abs(e.SemiMajorNM-2*2.4477) > 1e-3 || math.Abs(e.SemiMinorNM-2.4477) > 1e-3 || math.Abs(e.Axis.Deg()-30) > 1e-9 {
		t.Errorf("ellipse %+v (axis %.3f°), want 4.895 by 2.448 along 30°", e, e.Axis.Deg())
	}
}

func TestGaps(t *testing.T) {
	for _, c := range []struct {
		azimuths        []float64
		least, greatest float64
	}{
		{[]float64{0, 120, 240}, 120, 120},
		{[]float64{350, 10, 100}, 20, 250},
		{[]float64{10, 20, 30}, 10, 340},
		{[]float64{45}, 360, 360},
	} {
		var a []unit.Angle
		for _, d := range c.azimuths {
			a = append(a, unit.AngleFromDeg(d))
		}
		least, greatest := Gaps(a...)
		if math.Abs(least.Deg()-c.least) > 1e-9 || math.Abs(greatest.Deg()-c.greatest) > 1e-9 {
			t.Errorf("%v: gaps %.3f° and %.3f°, want %v and %v", c.azimuths, least.Deg(), greatest.Deg(), c.least, c.greatest)
		}
	}
}

// Turning all bearings together changes no expected error and turns the axis;
// one more sight never makes a fix worse.
func TestFixInvariants(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		azimuths := rapid.SliceOfN(rapid.Float64Range(0, 359), 3, 7).Draw(t, "azimuths")
		turn := rapid.Float64Range(0, 359).Draw(t, "turn")
		common := unit.AngleFromMin(rapid.Float64Range(0, 2).Draw(t, "common"))
		before := FixCovariance(sightsAt(0.5, azimuths...), common).ExpectedError()
		if before > 50 { // nearly no cross: only its size is at stake
			t.Skip()
		}
		turned := make([]float64, len(azimuths))
		for i, a := range azimuths {
			turned[i] = a + turn
		}
		after := FixCovariance(sightsAt(0.5, turned...), common).ExpectedError()
		if math.Abs(after/before-1) > 1e-6 {
			t.Fatalf("%.8f NM turned to %.8f", before, after)
		}
		more := FixCovariance(sightsAt(0.5, append(azimuths, turn)...), common).ExpectedError()
		if more > before*(1+1e-9) {
			t.Fatalf("one more sight: %.8f NM, before %.8f", more, before)
		}
	})
}
