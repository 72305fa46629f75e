package calendars

import (
	"io"
	"testing"
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
