package astro

import (
	"math"

	"github.com/soniakeys/meeus/v3/refraction"
	"github.com/soniakeys/unit"
)

// Sextant is what an altitude measured above the sea horizon depends on beside
// the body.
type Sextant struct {
	EyeM         float64    // height of eye above the sea, metres, 0 or more
	IndexError   unit.Angle // positive on the arc: the sextant reads too much
	TemperatureC float64    // degrees Celsius
	PressureHPa  float64    // hectopascals
}

// Limb is the part of a disc brought to the horizon.
type Limb int

// The limbs. Stars and planets are taken at their centre.
const (
	Centre Limb = iota
	Lower
	Upper
)

// String gives the limb's name.
func (l Limb) String() string { return [...]string{"centre", "lower", "upper"}[l] }

// Dip is the depression of the sea horizon: 1.76' times the root of the height
// of eye in metres (Nautical Almanac, explanation of the tables).
func (s Sextant) Dip() unit.Angle { return unit.AngleFromMin(1.76 * math.Sqrt(s.EyeM)) }

// Refraction at an apparent altitude: Bennett's formula (Meeus ch. 16, good to
// 0.07' above the horizon), made to fit temperature and pressure by the factor
// 0.28 P/(T + 273) of the Nautical Almanac. The formula turns over at -1.7°;
// below, its value there holds.
func (s Sextant) Refraction(apparent unit.Angle) unit.Angle {
	lowest := unit.AngleFromDeg(-1.69)
	factor := 0.28 * s.PressureHPa / (s.TemperatureC + 273)
	return refraction.Bennett(max(apparent, lowest)).Mul(factor)
}

// Observed turns a sextant altitude Hs of a limb into the observed altitude Ho
// of the body's centre, as an almanac's rules do: index error and dip, then
// refraction, then parallax in altitude at the limb and semidiameter. Taking
// the parallax at the limb contains the Moon's augmentation.
func (s Sextant) Observed(hs unit.Angle, p Place, limb Limb) unit.Angle {
	apparent := hs - s.IndexError - s.Dip()
	h := apparent - s.Refraction(apparent)
	h += p.HP.Mul(h.Cos())
	switch limb {
	case Lower:
		h += p.SD
	case Upper:
		h -= p.SD
	}
	return h
}

// Preset is the inverse of Observed: the Hs to set for a body whose centre has
// the computed altitude hc, within 0.001' for altitudes above 1°.
func (s Sextant) Preset(hc unit.Angle, p Place, limb Limb) unit.Angle {
	const close = 1e-8 // radians: 0.00003'
	hs := hc
	for range 10 {
		step := hc - s.Observed(hs, p, limb)
		hs += step
		if math.Abs(step.Rad()) < close {
			break
		}
	}
	return hs
}
