package calendars

import (
	"bytes"
	"io"
	"testing"
	"time"

	"gloam/plan"
	"gloam/track"
)

// BenchmarkWrite writes the calendar of a passage of some five days.
func BenchmarkWrite(b *testing.B) {
	p := voyage(b, "Yawl Sorrel", "Cascais", "2027-02-10T12:00:00Z")
	b.ReportAllocs()
	for b.Loop() {
		if err := Write(io.Discard, p, usual); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N)/float64(len(p.Windows())), "µs/window")
}

// BenchmarkReplanAndUpdate plans a voyage of 60 days anew, half a day late, and
// brings its calendar of star windows up to date.
func BenchmarkReplanAndUpdate(b *testing.B) {
	first := longVoyage(b, "2027-01-10T12:00:00Z")
	old := written(b, planned(b, first), usual)
	late := longVoyage(b, "2027-01-11T00:00:00Z")
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Update(io.Discard, bytes.NewReader(old), planned(b, late), usual); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(late.Arrival.Sub(late.Departure).Hours()/24, "days")
}

func longVoyage(b *testing.B, departure string) *track.Passage {
	b.Helper()
	at, err := time.Parse(time.RFC3339, departure)
	if err != nil {
		b.Fatal(err)
	}
	r := &track.Route{Name: "Long haul", Waypoints: []track.Waypoint{
		{Position: track.PositionFromDeg(38, -9)}, {Position: track.PositionFromDeg(-34, 18)}, {Position: track.PositionFromDeg(-43, 147)},
	}}
	p, err := r.Sail(track.Orders{Departure: at, SpeedKn: 7.395})
	if err != nil {
		b.Fatal(err)
	}
	return p
}

func planned(b *testing.B, p *track.Passage) *plan.Plan {
	b.Helper()
	set := plan.DefaultSettings()
	set.Kinds = []plan.ItemKind{plan.Stars}
	made, err := plan.New(p, set)
	if err != nil {
		b.Fatal(err)
	}
	return made
}

// BenchmarkUpdate is the second half of that alone.
func BenchmarkUpdate(b *testing.B) {
	old := written(b, planned(b, longVoyage(b, "2027-01-10T12:00:00Z")), usual)
	late := planned(b, longVoyage(b, "2027-01-11T00:00:00Z"))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Update(io.Discard, bytes.NewReader(old), late, usual); err != nil {
			b.Fatal(err)
		}
	}
}
