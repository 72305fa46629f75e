package astro

import (
	"math"
	"math/rand/v2"
	"testing"
	"time"
)

// The interpolation's own error: 0.001', a hundredth of what is printed.
func TestTableFollowsMoment(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	from := time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)
	to := from.AddDate(0, 0, 200)
	for _, b := range []Body{Sun, Moon, Venus} {
		table := NewTable(b, from, to, DeltaT)
		var s spread
		for range 2000 {
			at := from.Add(time.Duration(rng.Int64N(int64(to.Sub(from)))))
			got, want := table.Place(at), NewMoment(at, DeltaT(at)).Place(b)
			s.add(off(got.GHA, want.GHA) * want.Dec.Cos())
			s.add(off(got.Dec, want.Dec))
			s.add(off(got.HP, want.HP))
		}
		for _, at := range []time.Time{from, to} {
			s.add(off(table.Place(at).Dec, NewMoment(at, DeltaT(at)).Place(b).Dec))
		}
		if s.worst > 0.001 || math.IsNaN(s.sum) {
			t.Errorf("%v: worst %.5f', want 0.001' or less", b, s.worst)
		}
		t.Logf("%v: worst %.6f'", b, s.worst)
	}
}

func BenchmarkTablePlace(b *testing.B) {
	from := time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC)
	table := NewTable(Sun, from, from.AddDate(0, 0, 15), DeltaT)
	for i := 0; b.Loop(); i++ {
		table.Place(from.Add(time.Duration(i%300) * time.Hour))
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
