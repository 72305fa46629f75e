package plan

import (
	"sort"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// EventKind names an event, as written in the plan's JSON.
type EventKind string

// The kinds of event.
const (
	Sunrise         EventKind = "sunrise"
	Sunset          EventKind = "sunset"
	CivilDawn       EventKind = "civil-dawn"
	CivilDusk       EventKind = "civil-dusk"
	NauticalDawn    EventKind = "nautical-dawn"
	NauticalDusk    EventKind = "nautical-dusk"
	Moonrise        EventKind = "moonrise"
	Moonset         EventKind = "moonset"
	MeridianPassage EventKind = "meridian-passage"
)

// Event is an instant at which a body crosses an altitude, or the Sun the
// meridian, as seen from the moving ship.
type Event struct {
	Kind EventKind
	Time time.Time // UTC
	track.Position
}

// Altitudes of the Sun's centre, geocentric: at sunrise and sunset refraction
// of 34' and a semidiameter of 16' bring the upper limb to the horizon.
var (
	sunriseAltitude  = unit.AngleFromMin(-50)
	civilTwilight    = unit.AngleFromDeg(-6)
	nauticalTwilight = unit.AngleFromDeg(-12)
)

// moonriseAltitude is the Moon's geocentric altitude when its upper limb is on
// the horizon: parallax less semidiameter, 0.7275 HP, less refraction of 34'.
func moonriseAltitude(p astro.Place) unit.Angle {
	return p.HP.Mul(0.7275) - unit.AngleFromMin(34)
}

// sunEvents are the Sun's altitudes searched and what crossing them is called.
var sunEvents = []struct {
	level           unit.Angle
	rising, sinking EventKind
}{
	{sunriseAltitude, Sunrise, Sunset},
	{civilTwilight, CivilDawn, CivilDusk},
	{nauticalTwilight, NauticalDawn, NauticalDusk},
}

// events finds all events of the passage, in order of time. See [crossings]
// for why none can be missed.
func (s *sky) events() []Event {
	var all []Event
	add := func(found []crossing, rising, sinking EventKind) {
		for _, c := range found {
			kind := sinking
			if c.rising {
				kind = rising
			}
			all = append(all, Event{kind, c.time, s.passage.At(c.time).Position})
		}
	}
	for _, e := range sunEvents {
		add(s.sunCrossings(e.level), e.rising, e.sinking)
	}
	add(s.crossings(s.above(astro.Moon, moonriseAltitude)), Moonrise, Moonset)
	add(s.meridianPassages(), MeridianPassage, MeridianPassage)
	sort.SliceStable(all, func(i, j int) bool { return all[i].Time.Before(all[j].Time) })
	return all
}

// poleMiss is the cosine of latitude within which the ship passes over a pole,
// where any hour angle may be called zero: 60 m.
const poleMiss = 1e-5

// meridianPassages finds when the Sun's LHA is zero.
func (s *sky) meridianPassages() []crossing {
	var passages []crossing
	for _, c := range s.crossings(s.transit) {
		if angle, scale := s.sunLHA(c.time); angle.Cos() > 0 && scale > poleMiss {
			passages = append(passages, c)
		}
	}
	return passages
}

// transit is cos φ cos δ sin LHA of the Sun, which is zero on the meridian and
// stays smooth even where longitude runs wild.
func (s *sky) transit(t time.Time) float64 {
	angle, scale := s.sunLHA(t)
	return scale * angle.Sin()
}

// sunLHA gives the Sun's LHA, and cos φ cos δ.
func (s *sky) sunLHA(t time.Time) (lha unit.Angle, scale float64) {
	fix := s.passage.At(t)
	p := s.ephemeris.Place(astro.Sun, t)
	return p.GHA + fix.Lon, fix.Lat.Cos() * p.Dec.Cos()
}
