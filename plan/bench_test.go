package plan

import (
	"io"
	"testing"
	"time"

	"gloam/track"
)

// longPassage is an invented voyage of about as many days as wanted: back and
// forth between two latitudes, at 8 knots.
func longPassage(tb testing.TB, days int) *track.Passage {
	tb.Helper()
	const leg, speed = 20 * 60, 8
	r := &track.Route{Name: "to and fro"}
	for left := float64(days * 24 * speed); ; left -= leg {
		lat := 20.0
		if len(r.Waypoints)%2 == 1 {
			lat = 20 + min(left+leg, leg)/60
		}
		r.Waypoints = append(r.Waypoints, track.Waypoint{Position: track.PositionFromDeg(lat, -40)})
		if left <= 0 && len(r.Waypoints) > 1 {
			break
		}
	}
	p, err := r.Sail(track.Orders{Departure: time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC), SpeedKn: speed})
	if err != nil {
		tb.Fatal(err)
	}
	return p
}

// benchmarkPlan reports the cost of a voyage's day beside the usual figures.
func benchmarkPlan(b *testing.B, days int, set Settings) {
	p := longPassage(b, days)
	sailed := p.Arrival.Sub(p.Departure).Hours() / 24
	b.ReportAllocs()
	for b.Loop() {
		if _, err := New(p, set); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(sailed, "days")
	b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/sailed, "µs/day")
}

func BenchmarkPlan15Days(b *testing.B)  { benchmarkPlan(b, 15, DefaultSettings()) }
func BenchmarkPlan150Days(b *testing.B) { benchmarkPlan(b, 150, DefaultSettings()) }

// Everything included, moonlit windows too.
func BenchmarkPlan30DaysWhole(b *testing.B) {
	set := DefaultSettings()
	set.Kinds = ItemKinds
	benchmarkPlan(b, 30, set)
}

// With rounds of one sight nothing is chosen: events, windows, what can be
// seen, and all triads.
func BenchmarkTriads15Days(b *testing.B) {
	set := DefaultSettings()
	set.Sights, set.Kinds = 1, []ItemKind{Stars}
	benchmarkPlan(b, 15, set)
}

// Star windows with their rounds, and nothing of the day's work.
func BenchmarkStars15Days(b *testing.B) {
	set := DefaultSettings()
	set.Kinds = []ItemKind{Stars}
	benchmarkPlan(b, 15, set)
}

func BenchmarkWriteText(b *testing.B) {
	p := planOf(b, longPassage(b, 15), DefaultSettings())
	b.ReportAllocs()
	for b.Loop() {
		if err := p.WriteText(io.Discard, UsualKinds, false); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkWriteJSON(b *testing.B) {
	p := planOf(b, longPassage(b, 15), DefaultSettings())
	b.ReportAllocs()
	for b.Loop() {
		if err := p.WriteJSON(io.Discard, UsualKinds); err != nil {
			b.Fatal(err)
		}
	}
}
