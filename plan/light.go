package plan

import (
	"math"
	"slices"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

// Light is how bright a part of the day is.
type Light int

// The lights, from dark to bright: the Sun below -12°, -6°, -50', and above.
const (
	Night Light = iota
	NauticalTwilight
	CivilTwilight
	Daylight
)

// String gives the light in words.
func (l Light) String() string {
	return [...]string{"night", "nautical twilight", "civil twilight", "daylight"}[l]
}

// LightSpan is a part of the day of one light.
type LightSpan struct {
	From, To time.Time // UTC
	Light    Light
}

// Span is a part of the day.
type Span struct{ From, To time.Time } // UTC

// light takes the day apart at its events.
func (s *sky) light(d *Day) []LightSpan {
	var all []LightSpan
	for _, span := range d.cut(func(k EventKind) bool { return k != Moonrise && k != Moonset && k != MeridianPassage }) {
		light := lightOf(s.altitude(astro.Sun, middle(span.From, span.To)))
		if n := len(all); n > 0 && all[n-1].Light == light {
			all[n-1].To = span.To
			continue
		}
		all = append(all, LightSpan{span.From, span.To, light})
	}
	return all
}

func lightOf(sun unit.Angle) Light {
	switch {
	case sun >= sunriseAltitude:
		return Daylight
	case sun >= civilTwilight:
		return CivilTwilight
	case sun >= nauticalTwilight:
		return NauticalTwilight
	}
	return Night
}

// moonUp are the parts of the day in which the Moon is above the horizon.
func (s *sky) moonUp(d *Day) (all []Span) {
	for _, span := range d.cut(func(k EventKind) bool { return k == Moonrise || k == Moonset }) {
		p, hc, _ := s.place(astro.Moon, middle(span.From, span.To))
		if hc > moonriseAltitude(p) {
			all = append(all, span)
		}
	}
	return all
}

// cut takes the day apart at events of some kinds.
func (d *Day) cut(wanted func(EventKind) bool) (spans []Span) {
	from := d.From
	for _, e := range d.Events {
		if wanted(e.Kind) && e.Time.After(from) {
			spans = append(spans, Span{from, e.Time})
			from = e.Time
		}
	}
	if d.To.After(from) {
		spans = append(spans, Span{from, d.To})
	}
	return spans
}

// moonPhase is how the Moon looks when it stands highest, to an hour, between
// two instants.
func (s *sky) moonPhase(from, to time.Time) MoonPhase {
	best, highest := from, s.altitude(astro.Moon, from)
	for t := from; t.Before(to); t = t.Add(time.Hour) {
		if h := s.altitude(astro.Moon, t); h > highest {
			best, highest = t, h
		}
	}
	lit := func(t time.Time) float64 { return s.ephemeris.Place(astro.Moon, t).Illuminated }
	fix := s.passage.At(best)
	return MoonPhase{
		Illuminated: lit(middle(from, to)), Waxing: lit(best.Add(time.Hour)) > lit(best),
		Tilt: astro.LitSide(s.ephemeris.At(best), fix.Lat, fix.Lon), Highest: best,
	}
}

// BestThree are the three sights of a round that give the best fix if time is
// short, in the order of the round.
func (w *Window) BestThree(set *Settings) []RoundSight {
	least, best := math.Inf(1), []int(nil)
	n, weight := len(w.Round), commonWeight(set.CommonError)
	part := func(i int) information { return Sight{w.Round[i].Azimuth, w.Round[i].Error}.information() }
	for i := range n {
		for j := i + 1; j < n; j++ {
			for k := j + 1; k < n; k++ {
				sum := part(i).add(part(j)).add(part(k))
				if x := sum.square(weight); x < least {
					least, best = x, []int{i, j, k}
				}
			}
		}
	}
	var three []RoundSight
	for _, i := range best {
		three = append(three, w.Round[i])
	}
	return slices.Clip(three)
}
