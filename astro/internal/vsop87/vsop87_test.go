package vsop87

import (
	"bytes"
	"math"
	"testing"
)

// The theory's own check values at J2000 (Bretagnon & Francou, file
// vsop87.chk), from memory: longitude, latitude (rad), distance (AU). Gen leaves
// out terms under 2e-9 to 8e-9 of a radian, some hundreds for each planet; their
// sum grows to some twenty times one of them. In the distance likewise, as a
// part of it.
func TestCheckValues(t *testing.T) {
	for p, c := range map[Planet]struct {
		want [3]float64
		cut  float64
	}{
		Earth:   {[3]float64{1.7519238681, -0.0000039656, 0.9833276819}, 6e-9},
		Venus:   {[3]float64{3.1870221833, 0.0569782849, 0.7202129253}, 2e-9},
		Mars:    {[3]float64{6.2735389983, -0.0247779824, 1.3912076925}, 2.5e-9},
		Jupiter: {[3]float64{0.6334614186, -0.0205001039, 4.9653813154}, 6e-9},
		Saturn:  {[3]float64{0.7980038761, -0.0401984149, 9.1838483715}, 8e-9},
	} {
		v, _ := p.PlaceVelocity(0)
		r := math.Hypot(math.Hypot(v[0], v[1]), v[2])
		got := [3]float64{math.Mod(math.Atan2(v[1], v[0])+2*math.Pi, 2*math.Pi), math.Asin(v[2] / r), r}
		for i, scale := range [3]float64{1, 1, c.want[2]} {
			if math.Abs(got[i]-c.want[i]) > 20*c.cut*scale {
				t.Errorf("%s: %.10f, want %.10f", Names[p], got, c.want)
			}
		}
	}
}

// Distances from the Sun keep between the planets' least and greatest (AU, from
// memory) in all the years served; other planets' pull shifts these by less than
// the 1 % allowed.
func TestDistancesKeepInBounds(t *testing.T) {
	for p, bounds := range map[Planet][2]float64{
		Earth: {0.983, 1.017}, Venus: {0.718, 0.728}, Mars: {1.381, 1.666}, Jupiter: {4.950, 5.455}, Saturn: {9.01, 10.09},
	} {
		for tau := -0.01; tau <= 0.1; tau += 1e-4 {
			v, _ := p.PlaceVelocity(tau)
			r := math.Hypot(math.Hypot(v[0], v[1]), v[2])
			if r < bounds[0]*0.99 || r > bounds[1]*1.01 {
				t.Fatalf("%s at τ %.4f: %.4f AU", Names[p], tau, r)
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
