package series

import (
	"math"
	"reflect"
	"testing"

	"pgregory.net/rapid"
)

// drawSeries draws up to four powers of up to five terms.
func drawSeries(t *rapid.T) Series {
	number := rapid.Float64Range(-10, 10)
	term := rapid.Custom(func(t *rapid.T) Term {
		return Term{number.Draw(t, "A"), number.Draw(t, "B"), number.Draw(t, "C")}
	})
	return rapid.SliceOfN(rapid.SliceOfN(term, 0, 5), 0, 4).Draw(t, "series")
}

// Sums against the definition, worked by hand.
func TestSum(t *testing.T) {
	quarter := math.Pi / 2
	for _, c := range []struct {
		name      string
		series    Series
		t         float64
		sum, rate float64
	}{
		{"nothing", nil, 3, 0, 0},
		{"a constant", Series{{{A: 5}}}, 3, 5, 0},
		{"a parabola", Series{{{A: 1}}, {{A: -2}}, {{A: 4}}}, 3, 1 - 6 + 36, -2 + 24},
		{"no term in a power", Series{{}, {}, {{A: 1}}}, 3, 9, 6},
		{"a cosine", Series{{{A: 2, B: quarter, C: quarter}}}, 1, -2, 0},
		{"a cosine times t", Series{nil, {{A: 2, C: quarter}}}, 1, 0, -2 * quarter},
		{"terms of one power", Series{{{A: 2}, {A: 3, B: 2 * quarter}}}, 7, -1, 0},
	} {
		sum, rate := c.series.SumRate(c.t)
		// 1e-12: rounding of sine and cosine.
		if math.Abs(sum-c.sum) > 1e-12 || math.Abs(rate-c.rate) > 1e-12 || math.Abs(c.series.Sum(c.t)-c.sum) > 1e-12 {
			t.Errorf("%s: Sum %v, SumRate %v and %v, want %v and %v", c.name, c.series.Sum(c.t), sum, rate, c.sum, c.rate)
		}
	}
}

// Both ways to the sum agree, and the rate is the slope by differences. Over
// half steps of 1e-4 these err by 1e-8/6 of the third derivative, here at most
// some 3e5: 5e-4, hence 1e-3.
func TestRateIsTheSlope(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSeries(t)
		at := rapid.Float64Range(-1, 1).Draw(t, "t")
		sum, rate := s.SumRate(at)
		if d := s.Sum(at) - sum; math.Abs(d) > 1e-9 {
			t.Fatalf("sums differ by %v", d)
		}
		const half = 1e-4
		if slope := (s.Sum(at+half) - s.Sum(at-half)) / (2 * half); math.Abs(slope-rate) > 1e-3 {
			t.Fatalf("rate %v, slope %v", rate, slope)
		}
	})
}

// What is packed comes back, and nothing is left over.
func TestPackedRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		want := drawSeries(t)
		var p Packed
		p.PutFloats(1.5, -2)
		p.PutSeries(want)
		p.PutCount(65535)
		var numbers [2]float64
		p.Floats(numbers[:])
		got := p.Series()
		if n := p.Count(); n != 65535 || len(p) != 0 || numbers != [2]float64{1.5, -2} {
			t.Fatalf("numbers %v, count %d, %d bytes left", numbers, n, len(p))
		}
		if len(got) != len(want) || got.Len() != want.Len() {
			t.Fatalf("%d powers with %d terms, want %d with %d", len(got), got.Len(), len(want), want.Len())
		}
		for k := range want {
			if len(want[k]) > 0 && !reflect.DeepEqual(got[k], want[k]) {
				t.Fatalf("power %d: %v, want %v", k, got[k], want[k])
			}
		}
	})
}

// A term stays if it reaches the limit at the end of the span.
func TestCut(t *testing.T) {
	s := Series{{{A: 1}, {A: -0.11}, {A: 0.01}}, {{A: 1.1}, {A: 0.9}}, {{A: -11}, {A: 9}}}
	want := Series{{{A: 1}, {A: -0.11}}, {{A: 1.1}}, {{A: -11}}}
	got := s.Cut(0.1, 0.1)
	if !reflect.DeepEqual(got, want) || got.Len() != 4 || s.Len() != 7 {
		t.Errorf("%v, want %v; %d terms of %d", got, want, got.Len(), s.Len())
	}
}
