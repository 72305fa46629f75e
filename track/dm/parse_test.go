package dm

import (
	"math"
	"strings"
	"testing"

	"github.com/soniakeys/unit"
)

func TestParsePosition(t *testing.T) {
	for _, text := range []string{
		"49 12.4N 12 30W", "49 12.4N 012 30.0W", "49°12.4'N, 012°30.0'W", "49° 12.4' N 012° 30.0' W", "49-12.4N 012-30.0W",
		"4912.4N01230.0W", "4912.4n 01230.0w", "49.206666667,-12.5", "49.206666667 -12.5", "49.206666667N 12.5W", " 49 12.4 N , 12 30 W ",
	} {
		lat, lon, err := ParsePosition(text)
		if err != nil || math.Abs(lat.Min()-(49*60+12.4)) > 1e-4 || math.Abs(lon.Min()+12*60+30) > 1e-4 {
			t.Errorf("%q: %v %v (%v)", text, lat.Deg(), lon.Deg(), err)
		}
	}
	if lat, lon, err := ParsePosition("5S 170E"); err != nil || lat.Deg() != -5 || lon.Deg() != 170 {
		t.Errorf("5S 170E: %v %v (%v)", lat.Deg(), lon.Deg(), err)
	}
}

func TestParsePositionRefuses(t *testing.T) {
	for text, want := range map[string]string{
		"":                 `"49 12.4N 012 30.0W"`,
		"here":             `"49 12.4N 012 30.0W"`,
		"49 12.4 12 30":    `"49 12.4N 012 30.0W"`,
		"12 30W 49 12.4N":  `"49 12.4N 012 30.0W"`,
		"91,0":             "latitude up to 90",
		"0,181":            "longitude up to 180",
		"49 60.0N 012 30W": "minutes of 60",
		"NaN,NaN":          `"49 12.4N 012 30.0W"`,
	} {
		if _, _, err := ParsePosition(text); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: %v, want %q", text, err, want)
		}
	}
}

// What is printed is read back, to the tenth of a minute printed.
func FuzzParsePosition(f *testing.F) {
	f.Add("49 12.4N 12 30W")
	f.Fuzz(func(t *testing.T, text string) {
		lat, lon, err := ParsePosition(text)
		if err != nil {
			return
		}
		again, against, err := ParsePosition(Position(lat, lon))
		if err != nil || math.Abs((again-lat).Min()) > 0.051 || math.Abs((against-lon).Min()) > 0.051 {
			t.Errorf("%q: %v %v read back as %v %v (%v)", text, lat, lon, again, against, err)
		}
		if lat > unit.AngleFromDeg(90) || lon < unit.AngleFromDeg(-180) {
			t.Errorf("%q: %v %v", text, lat, lon)
		}
	})
}
