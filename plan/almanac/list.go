package almanac

import (
	"time"

	"gloam/astro"
	"gloam/track"
)

// MaxHours is how many hours a list may span.
const MaxHours = 400 * 24

// The span of instants served.
var Earliest, Latest = track.Earliest, track.Latest

// Serves tells whether an instant lies in [Earliest, Latest).
func Serves(t time.Time) bool { return !t.Before(Earliest) && t.Before(Latest) }

// DeltaT gives ΔT = TT - UT1 at an instant, as [astro.DeltaT] does.
type DeltaT = func(time.Time) time.Duration

// Hours lists the hourly values of bodies for a count of full hours from the
// hour in which from lies: body by body, each in order of time.
func Hours(bodies []astro.Body, from time.Time, count int, deltaT DeltaT) []astro.Hourly {
	var all []astro.Hourly
	first := from.UTC().Truncate(time.Hour)
	for _, b := range bodies {
		for i := range count {
			all = append(all, astro.NewHourly(b, first.Add(time.Duration(i)*time.Hour), deltaT))
		}
	}
	return all
}

// Need is a span for which hourly values of some bodies are wanted.
type Need struct {
	Begin, End time.Time
	Bodies     []astro.Body
}

// ForNeeds lists what the spans need and nothing more: for each the full hours
// that hold it, of its Moon and planets, of Aries where it has stars, and each
// star once, since its SHA and declination hold for days.
func ForNeeds(needs []Need, deltaT DeltaT) []astro.Hourly {
	var all []astro.Hourly
	for _, n := range needs {
		first := n.Begin.UTC().Truncate(time.Hour)
		count := int(n.End.Sub(first)/time.Hour) + 1
		var stars, others []astro.Body
		for _, b := range n.Bodies {
			if b.Class() == astro.ClassStar {
				stars = append(stars, b)
			} else {
				others = append(others, b)
			}
		}
		if len(stars) > 0 {
			others = append([]astro.Body{astro.Aries}, others...)
		}
		all = append(all, Hours(others, first, count, deltaT)...)
		all = append(all, Hours(stars, first, 1, deltaT)...)
	}
	return all
}
