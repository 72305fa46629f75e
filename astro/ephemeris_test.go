package astro

import (
	"math"
	"math/rand/v2"
	"testing"
	"time"
)

// The interpolation's own error: 0.001', a hundredth of what is printed; lit
// part 0.001 and magnitude 0.02, for the Moon's has a sharp peak when full.
func TestEphemerisFollowsMoment(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	from := time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)
	to := from.AddDate(0, 0, 200)
	e := NewEphemeris(from, to, DeltaT)
	arc, look := make([]spread, len(Bodies())), make([]spread, len(Bodies()))
	compare := func(at time.Time) {
		m := NewMoment(at, DeltaT(at))
		for _, b := range Bodies() {
			got, want := e.Place(b, at), m.Place(b)
			arc[b].add(off(got.GHA, want.GHA) * want.Dec.Cos())
			arc[b].add(off(got.Dec, want.Dec))
			arc[b].add(off(got.HP, want.HP))
			arc[b].add(off(got.SD, want.SD))
			if b != Moon || want.Illuminated > 0.067 { // beyond, its magnitude means little
				look[b].add((got.Magnitude - want.Magnitude) / 20)
			}
			look[b].add(got.Illuminated - want.Illuminated)
		}
	}
	compare(from)
	compare(to)
	for range 500 {
		compare(from.Add(time.Duration(rng.Int64N(int64(to.Sub(from))))))
	}
	for _, b := range Bodies() {
		if !(arc[b].worst < 0.001 && look[b].worst < 0.001) || math.IsNaN(arc[b].sum+look[b].sum) {
			t.Errorf("%v: worst %.5f' and %.5f, want under 0.001 of each", b, arc[b].worst, look[b].worst)
		}
		if b < firstStar {
			t.Logf("%-8v worst %.6f', look %.6f", b, arc[b].worst, look[b].worst)
		}
	}
}

// At gives the same places.
func TestEphemerisAt(t *testing.T) {
	at := time.Date(2026, 11, 25, 7, 0, 0, 0, time.UTC)
	e := NewEphemeris(at.Add(-time.Hour), at.Add(time.Hour), DeltaT)
	for _, b := range Bodies() {
		if got, want := e.At(at).Place(b), e.Place(b, at); got != want {
			t.Errorf("%v %v, want %v", b, got, want)
		}
	}
}

func BenchmarkEphemerisPlace(b *testing.B) {
	from := time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)
	e := NewEphemeris(from, from.AddDate(0, 0, 15), DeltaT)
	for i := 0; b.Loop(); i++ {
		e.Place(Sun, from.Add(time.Duration(i%300)*time.Hour))
	}
}

func BenchmarkPlace(b *testing.B) {
	at := time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)
	for _, body := range []Body{Sun, Moon, Venus, Jupiter} {
		b.Run(body.String(), func(b *testing.B) {
			for b.Loop() {
				NewMoment(at, DeltaT(at)).Place(body)
			}
		})
	}
	b.Run("all", func(b *testing.B) {
		bodies := append(append([]Body{Sun, Moon, Aries}, Planets()...), Stars()...)
		for b.Loop() {
			m := NewMoment(at, DeltaT(at))
			for _, body := range bodies {
				m.Place(body)
			}
		}
	})
}
