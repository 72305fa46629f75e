package vsop87

import (
	"bytes"
	"math"
	"testing"
)

// The theory's own check values at J2000 (Bretagnon & Francou, file
// vsop87.chk), from memory: longitude, latitude (rad), distance (AU). The cut
// leaves out terms of up to 1e-8, of which many add up: 3e-7 is allowed.
func TestCheckValues(t *testing.T) {
	for p, want := range map[Planet][3]float64{
		Earth:   {1.7519238681, -0.0000039656, 0.9833276819},
		Venus:   {3.1870221833, 0.0569782849, 0.7202129253},
		Mars:    {6.2735389983, -0.0247779824, 1.3912076925},
		Jupiter: {0.6334614186, -0.0205001039, 4.9653813154},
		Saturn:  {0.7980038761, -0.0401984149, 9.1838483715},
	} {
		v, _ := p.PlaceVelocity(0)
		r := math.Hypot(math.Hypot(v[0], v[1]), v[2])
		got := [3]float64{math.Mod(math.Atan2(v[1], v[0])+2*math.Pi, 2*math.Pi), math.Asin(v[2] / r), r}
		for i, tolerance := range []float64{3e-7, 3e-7, 3e-7 * want[2]} {
			if math.Abs(got[i]-want[i]) > tolerance {
				t.Errorf("%s: %.10f, want %.10f", Names[p], got, want)
			}
		}
	}
}

// Velocity is the slope of place: by differences over six minutes to 1e-9 AU a day.
func TestVelocityIsTheSlope(t *testing.T) {
	const half = 1.0 / 480 / daysPerMillennium
	for p := Earth; p < count; p++ {
		for _, tau := range []float64{-0.01, 0.0267, 0.099} {
			_, v := p.PlaceVelocity(tau)
			a, _ := p.PlaceVelocity(tau - half)
			b, _ := p.PlaceVelocity(tau + half)
			for i := range v {
				if slope := (b[i] - a[i]) * 240; math.Abs(slope-v[i]) > 1e-9 {
					t.Errorf("%s at %v: velocity %.12f, slope %.12f", Names[p], tau, v[i], slope)
				}
			}
		}
	}
}

func TestPackUnpack(t *testing.T) {
	if !bytes.Equal(unpack(packed).Pack(), packed) {
		t.Error("packing what was unpacked gives another file")
	}
}
