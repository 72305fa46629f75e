package plan

import (
	"math"
	"sort"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// Candidate is a body that can be shot in a window, as seen from the DR
// position.
type Candidate struct {
	Body astro.Body
	astro.Place
	Altitude, Azimuth unit.Angle // Hc and Zn
	Limb              astro.Limb // the one to bring to the horizon
	EitherLimb        bool       // the other serves as well, with its own preset
	Preset            unit.Angle // Hs to set on the sextant
	Error             unit.Angle // standard error of the sight
	From, To          time.Time  // the span of the window in which it can be shot
}

// shootable are the bodies considered in a star window.
var shootable = append(append([]astro.Body{astro.Moon}, astro.Planets()...), astro.Stars()...)

// candidates finds the bodies between the altitude limits, in order of
// azimuth.
func (set *Settings) candidates(sky astro.Sky, at track.Position) []Candidate {
	var all []Candidate
	for _, b := range shootable {
		hc, _ := sky.Place(b).From(at.Lat, at.Lon)
		if hc >= set.LowestAltitude && hc <= set.HighestAltitude {
			all = append(all, set.candidate(sky, b, at))
		}
	}
	sort.SliceStable(all, func(i, j int) bool { return all[i].Azimuth < all[j].Azimuth })
	return all
}

// candidate is one body as seen from a position.
func (set *Settings) candidate(sky astro.Sky, b astro.Body, at track.Position) Candidate {
	p := sky.Place(b)
	c := Candidate{Body: b, Place: p}
	c.Altitude, c.Azimuth = p.From(at.Lat, at.Lon)
	if b == astro.Moon {
		c.Limb = astro.BrightLimb(sky, b, at.Lat, at.Lon)
		c.EitherLimb = astro.EitherLimb(sky, at.Lat, at.Lon)
	}
	c.Preset = set.Preset(c.Altitude, p, c.Limb)
	c.Error = set.sightError(c.Altitude)
	return c
}

// sightError is the standard error of a sight at an altitude: the observer's,
// a twentieth of the refraction, and 0.05' tan h for a sextant rocked a little
// out of the vertical.
func (set *Settings) sightError(h unit.Angle) unit.Angle {
	own, air := set.SightError.Min(), 0.05*set.Refraction(h).Min()
	tilt := 0.05 * math.Min(h.Tan(), 1e3)
	return unit.AngleFromMin(math.Sqrt(own*own + air*air + tilt*tilt))
}
