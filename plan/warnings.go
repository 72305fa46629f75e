package plan

import (
	"fmt"
	"math"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

// How near bodies must stand for a word of warning.
var (
	nearMoon  = unit.AngleFromDeg(5)
	nearTwins = unit.AngleFromDeg(4)
)

// twins is how alike two neighbours' magnitudes must be to be taken for one
// another.
const twins = 1.5

// warnings tells of bodies hard to see beside the Moon or easily taken for one
// another, and of a horizon by moonlight.
func warnings(bodies []Candidate, moon astro.Place, l *lookout) (all []string) {
	for i, a := range bodies {
		if a.EitherLimb {
			all = append(all, fmt.Sprintf("either limb of the Moon is full; presets are for the %v one", a.Limb))
		}
		if d := a.Separation(moon); a.Body != astro.Moon && d < nearMoon {
			all = append(all, fmt.Sprintf("%v stands %.1f° from the Moon: hard to see", a.Body, d.Deg()))
		}
		for _, b := range bodies[:i] {
			if a.Body == astro.Moon || b.Body == astro.Moon || math.Abs(a.Magnitude-b.Magnitude) >= twins || math.Abs((a.Dec-b.Dec).Rad()) >= nearTwins.Rad() {
				continue // by now few pairs are left to be measured
			}
			if d := a.Separation(b.Place); d < nearTwins {
				all = append(all, fmt.Sprintf("%v and %v are %.1f° apart: do not take one for the other", b.Body, a.Body, d.Deg()))
			}
		}
	}
	if l.moonlit {
		all = append(all, "moonlight keeps the horizon longer, but under the Moon it can be false")
	}
	return all
}
