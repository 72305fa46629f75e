package elp

import (
	"bytes"
	"math"
	"testing"
)

// Rectangular places published with the theory (Chapront & Francou, program
// notes, fit to DE405), from memory: JD 2444239.5, 2446239.5, 2448239.5,
// 2450239.5, 2452239.5, kilometres. The cut moves the Moon by up to 0.0024',
// 0.27 km at its distance, and 5.2 km along the line of sight.
func TestPublishedPlaces(t *testing.T) {
	for jd, want := range map[float64][3]float64{
		2444239.5: {43890.2824, 381188.7274, -31633.3817},
		2446239.5: {-313664.5965, 212007.2667, 33744.7512},
		2448239.5: {-273220.0607, -296859.7682, -34604.3570},
		2450239.5: {171613.1419, -318097.3375, 31293.5482},
		2452239.5: {396530.0064, 47487.9225, -36085.3090},
	} {
		got := Place((jd - 2451545) / 36525)
		d := math.Sqrt(math.Pow(got[0]-want[0], 2) + math.Pow(got[1]-want[1], 2) + math.Pow(got[2]-want[2], 2))
		if d > 6 {
			t.Errorf("JD %.1f: %.3f, want %.3f: %.2f km apart", jd, got, want, d)
		}
	}
}

func TestDistanceIsThatOfPlace(t *testing.T) {
	for _, c := range []float64{-0.1, 0, 0.27, 1} {
		v := Place(c)
		if d := math.Sqrt(v[0]*v[0]+v[1]*v[1]+v[2]*v[2]) - Distance(c); math.Abs(d) > 1e-6 {
			t.Errorf("t %v: distance differs by %v km", c, d)
		}
	}
}

func TestPackUnpack(t *testing.T) {
	if !bytes.Equal(unpack(packed).Pack(), packed) {
		t.Error("packing what was unpacked gives another file")
	}
}
