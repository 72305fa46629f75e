package plan

import (
	"math"
	"testing"
	"time"

	"pgregory.net/rapid"
)

var midnight = time.Date(2027, 1, 1, 0, 0, 0, 0, time.UTC)

func hoursAfter(t time.Time) float64 { return t.Sub(midnight).Hours() }

// wave is a cosine with a period of a day, as an altitude is, less a level.
func wave(level float64) func(time.Time) float64 {
	return func(t time.Time) float64 { return math.Cos(hoursAfter(t)*math.Pi/12) - level }
}

const waveBend = math.Pi * math.Pi / 144 // its greatest second derivative, per hour²

func TestCrossingsOfAWave(t *testing.T) {
	for _, c := range []struct {
		name  string
		level float64
		want  []float64 // hours after midnight
	}{
		{"level", 0, []float64{6, 18, 30, 42}},
		{"never", 1.0001, nil},
		{"always above", -1.0001, nil},
		{"from below", 0.5, []float64{4, 20, 28, 44}},
		// The wave tops the level by 1e-8 rad²/2 for a second before and after.
		{"seconds apart", math.Cos(math.Pi / 12 / 3600), []float64{1.0 / 3600, 24 - 1.0/3600, 24 + 1.0/3600, 48 - 1.0/3600}},
		{"touch from above", -1, nil},
	} {
		got := crossings(wave(c.level), midnight, midnight.Add(48*time.Hour), waveBend)
		if len(got) != len(c.want) {
			t.Errorf("%s: %d crossings, want %d", c.name, len(got), len(c.want))
			continue
		}
		for i, x := range got {
			// 20 ms: ten times the precision asked of a root, for rounding near a top.
			if math.Abs(hoursAfter(x.time)-c.want[i])*3600 > 0.02 {
				t.Errorf("%s: crossing %d at %.6f h, want %.6f", c.name, i, hoursAfter(x.time), c.want[i])
			}
			if want := i%2 == 1; x.rising != want {
				t.Errorf("%s: crossing %d rising %v, want %v", c.name, i, x.rising, want)
			}
		}
	}
}

// Whatever the level, and however near the tops, the search finds what
// arithmetic says: none missed, none invented.
func TestCrossingsMissNone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		near := rapid.Float64Range(0.0002, 6).Draw(t, "hours from the top")
		top := rapid.Float64Range(1, 20).Draw(t, "hour of the top")
		level := math.Cos(near * math.Pi / 12)
		f := func(at time.Time) float64 { return math.Cos((hoursAfter(at)-top)*math.Pi/12) - level }
		want := 0
		for _, x := range []float64{top - near, top + near, top + 24 - near, top + 24 + near, top - 24 + near} {
			if math.Abs(x) < 1e-6 || math.Abs(x-24) < 1e-6 {
				t.Skip("on an end of the span, where either answer is right")
			}
			if x > 0 && x < 24 {
				want++
			}
		}
		if got := crossings(f, midnight, midnight.Add(24*time.Hour), waveBend); len(got) != want {
			t.Fatalf("%d crossings, want %d", len(got), want)
		}
	})
}

// The work near a touch stays bounded: looking ever closer ends.
func TestTouchEnds(t *testing.T) {
	calls := 0
	f := wave(1)
	count := func(at time.Time) float64 { calls++; return f(at) }
	if got := crossings(count, midnight.Add(-9*time.Hour), midnight.Add(37*time.Hour), waveBend); len(got) > 0 {
		t.Errorf("%v, want no crossing", got)
	}
	if calls > 1000 {
		t.Errorf("%d evaluations for a touch, want 1000 or fewer", calls)
	}
}
