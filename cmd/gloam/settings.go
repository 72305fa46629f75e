package main

import (
	"errors"
	"fmt"
	"time"

	"github.com/soniakeys/unit"
	"github.com/spf13/cobra"

	"gloam/plan"
)

// settingsFlags are the flags of the observer, the sky and the round, which
// all commands that look for sights share.
type settingsFlags struct {
	eye, index, temperature, pressure   float64
	lowest, highest, sunUpper, sunLower float64
	sightError, commonError             float64
	humidity, gain                      float64
	horizonAway, horizonUnder           float64
	clouds, blind, without              []string
	sights                              int
	pace                                time.Duration
	loss, drError                       float64
	runError, sunClearance              float64
	deltaT                              deltaTFlag
	changed                             func(string) bool
}

func (f *settingsFlags) define(cmd *cobra.Command) {
	set, flags := plan.DefaultSettings(), cmd.Flags()
	f.changed = flags.Changed
	flags.Float64Var(&f.eye, "eye", set.EyeM, "height of eye, metres")
	flags.Float64Var(&f.index, "index-error", 0, "index error in minutes, on the arc positive")
	flags.Float64Var(&f.temperature, "temperature", set.TemperatureC, "air, degrees Celsius")
	flags.Float64Var(&f.pressure, "pressure", set.PressureHPa, "air, hectopascals")
	flags.Float64Var(&f.humidity, "humidity", 100*set.Humidity, "air, relative, per cent")
	flags.Float64Var(&f.lowest, "lowest", set.LowestAltitude.Deg(), "lowest altitude of a body to shoot, degrees")
	flags.Float64Var(&f.highest, "highest", set.HighestAltitude.Deg(), "highest altitude of a body to shoot, degrees")
	flags.Float64Var(&f.sunUpper, "sun-upper", set.UpperSun.Deg(), "Sun's altitude at the bright end of a window, degrees")
	flags.Float64Var(&f.sunLower, "sun-lower", set.LowerSun.Deg(), "Sun's altitude at the dark end of a window, degrees")
	flags.Float64Var(&f.horizonAway, "horizon-away", set.HorizonAway.Deg(), "Sun's altitude down to which the horizon opposite it serves, degrees")
	flags.Float64Var(&f.horizonUnder, "horizon-under", set.HorizonUnder.Deg(), "the same for the horizon under the Sun, degrees")
	flags.Float64Var(&f.gain, "telescope-gain", set.TelescopeGain, "magnitudes the sextant's telescope adds to the eye's reach")
	flags.StringArrayVar(&f.clouds, "cloud", nil, "true bearings under cloud, clockwise, as 180-260; may be given many times")
	flags.StringArrayVar(&f.blind, "blind", nil, "bearings from the bow without horizon, as 150-210; may be given many times")
	flags.StringArrayVar(&f.without, "without", nil, "a body to leave out; may be given many times")
	flags.IntVar(&f.sights, "sights", set.Sights, "most sights in a round, 1 to 8")
	flags.DurationVar(&f.pace, "pace", set.Pace, "time from one sight to the next, at least")
	flags.Float64Var(&f.loss, "loss", set.Loss, "chance that a sight is lost to cloud, 0 to under 1")
	flags.Float64Var(&f.sightError, "sight-error", set.SightError.Min(), "standard error of one sight, minutes")
	flags.Float64Var(&f.commonError, "common-error", set.CommonError.Min(), "standard error common to all sights of a window, minutes")
	flags.Float64Var(&f.drError, "dr-error", set.DRError, "standard error of the DR position, NM")
	flags.Float64Var(&f.runError, "run-error", 100*set.RunError, "standard error of a run, per cent of its length")
	flags.Float64Var(&f.sunClearance, "sun-clearance", set.SunClearance.Deg(), "how far from the Sun a telescope may point by day, degrees")
	f.deltaT.define(cmd)
	_ = cmd.RegisterFlagCompletionFunc("without", func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
		return bodyNames(), cobra.ShellCompDirectiveNoFileComp
	})
}

// settingFlags name the flag that sets what a plan calls otherwise.
var settingFlags = map[string]string{
	"height of eye (m)": "eye", "index error (')": "index-error", "temperature (°C)": "temperature", "pressure (hPa)": "pressure",
	"sight error (')": "sight-error", "common error (')": "common-error", "lowest altitude (°)": "lowest", "highest altitude (°)": "highest",
	"Sun's lower limit (°)": "sun-lower", "Sun's upper limit (°)": "sun-upper", "humidity (%)": "humidity", "telescope's gain (magnitudes)": "telescope-gain",
	"Sun's altitude for the horizon opposite it (°)": "horizon-away", "Sun's altitude for the horizon under it (°)": "horizon-under",
	"sights": "sights", "pace (s)": "pace", "chance of losing a sight": "loss", "error of the DR position (NM)": "dr-error",
	"error of the run (%)": "run-error", "angle kept from the Sun (°)": "sun-clearance",
}

// settingError tells which flag sets what is out of range.
func settingError(err error) error {
	var s *plan.SettingError
	if errors.As(err, &s) && settingFlags[s.Name] != "" {
		return hinted{err, "give --" + settingFlags[s.Name] + " within these limits, or leave it out"}
	}
	return hinted{err, "change the flag that sets it; --help lists them all"}
}

// settings turns the flags into settings; eyeM, where above zero, is the height
// of eye that a file gives, over which the flag wins.
func (f *settingsFlags) settings(eyeM float64) (plan.Settings, error) {
	set := plan.DefaultSettings()
	set.EyeM, set.DeltaT = f.eye, f.deltaT.at
	if eyeM > 0 && !f.changed("eye") {
		set.EyeM = eyeM
	}
	set.IndexError = unit.AngleFromMin(f.index)
	set.TemperatureC, set.PressureHPa, set.Humidity = f.temperature, f.pressure, f.humidity/100
	set.LowestAltitude, set.HighestAltitude = unit.AngleFromDeg(f.lowest), unit.AngleFromDeg(f.highest)
	set.UpperSun, set.LowerSun = unit.AngleFromDeg(f.sunUpper), unit.AngleFromDeg(f.sunLower)
	set.HorizonAway, set.HorizonUnder = unit.AngleFromDeg(f.horizonAway), unit.AngleFromDeg(f.horizonUnder)
	set.SightError, set.CommonError = unit.AngleFromMin(f.sightError), unit.AngleFromMin(f.commonError)
	set.TelescopeGain, set.Sights, set.Pace, set.Loss, set.DRError = f.gain, f.sights, f.pace, f.loss, f.drError
	set.RunError, set.SunClearance = f.runError/100, unit.AngleFromDeg(f.sunClearance)
	var err error
	if set.Clouds, err = parseArcs("--cloud", f.clouds); err != nil {
		return set, err
	}
	if set.Blind, err = parseArcs("--blind", f.blind); err != nil {
		return set, err
	}
	set.Without, err = parseBodies("--without", f.without)
	return set, err
}

func parseArcs(flag string, texts []string) (arcs []plan.Arc, err error) {
	for _, text := range texts {
		a, err := plan.ParseArc(text)
		if err != nil {
			return nil, usage(fmt.Errorf("%s %w", flag, err))
		}
		arcs = append(arcs, a)
	}
	return arcs, nil
}
