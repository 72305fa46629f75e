package plan

import (
	"fmt"
	"math"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// Settings is what a plan depends on beside the passage. Start from
// [DefaultSettings].
type Settings struct {
	astro.Sextant

	SightError  unit.Angle // standard error of one sight, above 0
	CommonError unit.Angle // standard error common to a round's sights, 0 or more

	LowestAltitude, HighestAltitude unit.Angle // limits of Hc for a candidate, 0° to 90°
	UpperSun, LowerSun              unit.Angle // the Sun's altitudes that bound a window, -18° to 0°

	// What can be seen.
	Humidity                  float64    // relative, 0.01 to 0.99
	TelescopeGain             float64    // magnitudes a telescope adds to the eye's reach, 0 to 6
	HorizonAway, HorizonUnder unit.Angle // Sun's altitude down to which the horizon serves, opposite the Sun and under it
	Clouds                    []Arc      // true bearings without sky
	Blind                     []Arc      // bearings from the bow without horizon
	Without                   []astro.Body

	// The round.
	Sights  int           // at most so many, 1 to 8
	Pace    time.Duration // from one sight to the next at least, 10 s to 1 h
	Loss    float64       // chance that a sight is lost, 0 to under 1
	DRError float64       // standard error of the DR position, north and east, NM, above 0

	// The day's work.
	RunError     float64    // standard error of a run, as a part of its length, 0 to 0.5
	SunClearance unit.Angle // how far from the Sun a telescope may point, 0° to 90°
	Kinds        []ItemKind // what the programme is to have

	DeltaT   func(time.Time) time.Duration // TT - UT1
	ShipTime track.ShipTime                // how the clock is kept; nil for nautical zones
}

// bestSun is the Sun's altitude at which a star window is best: stars out and
// horizon sharp.
var bestSun = unit.AngleFromDeg(-8.5)

// DefaultSettings are for a small boat: eye 2 m, sextant without error,
// standard air, half a minute of error each to a sight and to a round,
// candidates from 12° to 72°, windows between civil and nautical twilight, six
// sights three minutes apart, of which every fourth may be lost.
func DefaultSettings() Settings {
	return Settings{
		Sextant:         astro.Sextant{EyeM: 2, TemperatureC: 10, PressureHPa: 1010},
		SightError:      unit.AngleFromMin(0.5),
		CommonError:     unit.AngleFromMin(0.5),
		LowestAltitude:  unit.AngleFromDeg(12),
		HighestAltitude: unit.AngleFromDeg(72),
		UpperSun:        civilTwilight,
		LowerSun:        nauticalTwilight,
		Humidity:        0.7,
		TelescopeGain:   1,
		HorizonAway:     unit.AngleFromDeg(-10),
		HorizonUnder:    unit.AngleFromDeg(-11.5),
		Sights:          6,
		Pace:            3 * time.Minute,
		Loss:            0.25,
		DRError:         5,
		RunError:        0.05,
		SunClearance:    unit.AngleFromDeg(20),
		Kinds:           UsualKinds,
		DeltaT:          astro.DeltaT,
	}
}

// SettingError is a setting out of range.
type SettingError struct {
	Name            string // with its unit in brackets
	Value, Min, Max float64
}

// Error writes "NAME: VALUE (MIN to MAX)".
func (e *SettingError) Error() string {
	return fmt.Sprintf("%s: %.4g (%.4g to %.4g)", e.Name, e.Value, e.Min, e.Max)
}

// Validate tells the first setting that is out of range, as a *[SettingError],
// or what does not go together.
func (s Settings) Validate() error {
	for _, c := range []SettingError{
		{"height of eye (m)", s.EyeM, 0, 100},
		{"index error (')", s.IndexError.Min(), -60, 60},
		{"temperature (°C)", s.TemperatureC, -60, 60},
		{"pressure (hPa)", s.PressureHPa, 850, 1100},
		{"sight error (')", s.SightError.Min(), 0.01, 60},
		{"common error (')", s.CommonError.Min(), 0, 60},
		{"lowest altitude (°)", s.LowestAltitude.Deg(), 0, 90},
		{"highest altitude (°)", s.HighestAltitude.Deg(), s.LowestAltitude.Deg(), 90},
		{"Sun's lower limit (°)", s.LowerSun.Deg(), -18, 0},
		{"Sun's upper limit (°)", s.UpperSun.Deg(), s.LowerSun.Deg(), 0},
		{"humidity (%)", 100 * s.Humidity, 1, 99},
		{"telescope's gain (magnitudes)", s.TelescopeGain, 0, 6},
		{"Sun's altitude for the horizon opposite it (°)", s.HorizonAway.Deg(), -18, 0},
		{"Sun's altitude for the horizon under it (°)", s.HorizonUnder.Deg(), -18, 0},
		{"sights", float64(s.Sights), 1, 8},
		{"pace (s)", s.Pace.Seconds(), 10, 3600},
		{"chance of losing a sight", s.Loss, 0, 0.99},
		{"error of the DR position (NM)", s.DRError, 0.1, 100},
		{"error of the run (%)", 100 * s.RunError, 0, 50},
		{"angle kept from the Sun (°)", s.SunClearance.Deg(), 0, 90},
	} {
		if math.IsNaN(c.Value) || c.Value < c.Min-1e-9 || c.Value > c.Max+1e-9 {
			return &c
		}
	}
	if covered(s.Clouds) || covered(s.Blind) {
		return fmt.Errorf("arcs: they cover the whole horizon (leave some of it free)")
	}
	if s.UpperSun-s.LowerSun < unit.AngleFromDeg(0.01) || s.HighestAltitude-s.LowestAltitude < unit.AngleFromDeg(0.01) {
		return fmt.Errorf("limits: lower and upper are the same (the lower must be below the upper)")
	}
	return nil
}
