package astro

import (
	"math"
	"testing"
	"time"
)

// ΔT on 1 January as almanacs print it, from memory: to 0.1 s, hence 0.06 s.
func TestDeltaT(t *testing.T) {
	for year, want := range map[int]float64{1990: 56.9, 1995: 60.8, 2000: 63.8, 2005: 64.7, 2010: 66.1, 2015: 67.6, 2020: 69.4, 2023: 69.2} {
		if got := DeltaT(time.Date(year, 1, 1, 0, 0, 0, 0, time.UTC)).Seconds(); math.Abs(got-want) > 0.06 {
			t.Errorf("%d: %.3f s, want %.1f s", year, got, want)
		}
	}
}

// The table goes over into the extrapolation without a jump, and nothing
// before or after runs off. ΔT never changed by over 1.2 s a year in the table's
// time; 10 ms a day is three times that.
func TestDeltaTIsSmooth(t *testing.T) {
	last := DeltaT(time.Date(1989, 1, 1, 0, 0, 0, 0, time.UTC))
	for at := time.Date(1989, 1, 1, 0, 0, 0, 0, time.UTC); at.Year() < 2101; at = at.AddDate(0, 0, 1) {
		now := DeltaT(at)
		if d := now - last; d.Abs() > 10*time.Millisecond {
			t.Fatalf("%v: %v in a day", at, d)
		}
		last = now
	}
	if s := last.Seconds(); s < 70 || s > 130 { // forecasts of 2100 lie between
		t.Errorf("%.1f s at the end of 2100", s)
	}
}

// Days: Meeus, example 7.a, from memory: 1957 October 4.81 is JD 2436116.31.
func TestDaysSinceJ2000(t *testing.T) {
	at := time.Date(1957, 10, 4, 19, 26, 24, 0, time.UTC)
	if d := daysSinceJ2000(at) - (2436116.31 - 2451545); math.Abs(d) > 1e-8 {
		t.Errorf("off by %v days", d)
	}
	zone := time.FixedZone("", 11*3600)
	if a, b := daysSinceJ2000(at), daysSinceJ2000(at.In(zone)); a != b {
		t.Errorf("%v days, and %v for the same instant in another zone", a, b)
	}
}
