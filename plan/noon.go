package plan

import (
	"fmt"
	"math"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track/dm"
)

// How long before meridian passage to be ready, and how long after the greatest
// altitude the Sun has surely dipped.
const (
	noonReady = 15 * time.Minute
	noonOver  = 5 * time.Minute
)

// swings is how near to the zenith the Sun's bearing swings fast.
var swings = unit.AngleFromDeg(5)

// noons are the day's meridian passages of the Sun.
func (s *sky) noons(d *Day, set *Settings) (items []Item) {
	for _, e := range d.Events {
		if e.Kind == MeridianPassage {
			items = append(items, s.noon(e, set))
		}
	}
	return items
}

// noon is the Sun's meridian passage: the preset is for the greatest altitude,
// which can be seen, the rule for latitude is for the meridian.
func (s *sky) noon(e Event, set *Settings) Item {
	top := s.greatestAltitude(e.Time)
	item := Item{
		Kind: Noon, Title: "Noon: Sun on the meridian", Fix: s.passage.At(e.Time),
		Begin: e.Time.Add(-noonReady), Best: top, End: laterOf(e.Time, top).Add(noonOver),
	}
	sun, hc, zn := s.place(astro.Sun, e.Time)
	if hc < set.LowestAltitude {
		word := fmt.Sprintf("The Sun stands %s high, under the limit of %s", dm.Altitude(hc), wholeDegrees(set.LowestAltitude))
		if hc < 0 {
			word = fmt.Sprintf("The Sun does not rise: %s at noon", dm.Altitude(hc))
		}
		item.Title, item.Words = "Noon: no Sun to shoot", []string{word}
		return item
	}
	item.Sights = []RoundSight{s.sight(&Candidate{Body: astro.Sun, Limb: astro.Lower}, top, set)}
	item.ExpectedNM = math.Hypot(set.sightError(hc).Min(), set.CommonError.Min())
	if apart := top.Sub(e.Time).Round(time.Second); apart != 0 {
		when := "after"
		if apart < 0 {
			when, apart = "before", -apart
		}
		word := fmt.Sprintf("Greatest altitude %.0f s %s meridian passage", apart.Seconds(), when)
		if more := s.altitude(astro.Sun, top) - hc; more.Min() >= 0.05 {
			word += fmt.Sprintf(", and %.1f' above that of the meridian: take it off", more.Min())
		}
		item.Words = append(item.Words, word+" (the ship's way and the Sun's)")
	}
	item.Words = append(item.Words, latitudeRule(sun.Dec, hc, zn))
	if zenith := unit.AngleFromDeg(90) - hc; zenith < swings {
		item.Words = append(item.Words, s.swing(e.Time, zenith)...)
	}
	return item
}

// greatestAltitude finds when the Sun, seen from the moving ship, stops rising:
// where its altitude half a minute on and half a minute back are equal.
func (s *sky) greatestAltitude(passage time.Time) time.Time {
	const half = 30 * time.Second
	gain := func(t time.Time) float64 {
		return (s.altitude(astro.Sun, t.Add(half)) - s.altitude(astro.Sun, t.Add(-half))).Rad()
	}
	a, b := laterOf(passage.Add(-2*time.Hour), s.passage.Departure.Add(half)), earlierOf(passage.Add(2*time.Hour), s.passage.Arrival.Add(-half))
	if !a.Before(b) {
		return passage
	}
	fa, fb := gain(a), gain(b)
	if fa <= 0 || fb >= 0 { // close to a pole, or the passage ends: it only rises or falls
		return passage
	}
	return root(gain, a, b, fa, fb)
}

// latitudeRule says how latitude follows from the altitude on the meridian: the zenith
// distance is named opposite to the Sun's bearing, and is added to declination
// of the same name, or the less is taken from the greater.
func latitudeRule(dec, hc, zn unit.Angle) string {
	name := func(north bool) string {
		if north {
			return "N"
		}
		return "S"
	}
	zenithNorth := zn.Cos() < 0
	z := fmt.Sprintf("zenith distance %s %s", dm.Altitude(unit.AngleFromDeg(90)-hc), name(zenithNorth))
	d := fmt.Sprintf("declination %s %s", dm.Altitude(unit.Angle(math.Abs(dec.Rad()))), name(dec >= 0))
	side := "south"
	if !zenithNorth {
		side = "north"
	}
	if zenithNorth == (dec >= 0) {
		return fmt.Sprintf("Sun %s of the zenith; %s, %s: same name, latitude is the sum", side, z, d)
	}
	return fmt.Sprintf("Sun %s of the zenith; %s, %s: contrary names, latitude is the difference, named as the greater", side, z, d)
}

// swing tells the bearings of a Sun close to the zenith.
func (s *sky) swing(passage time.Time, zenith unit.Angle) []string {
	words := []string{fmt.Sprintf("Only %s from the zenith: the bearing swings fast", dm.Altitude(zenith))}
	line := "Zn"
	for _, m := range []int{-8, -4, -2, 0, 2, 4, 8} {
		_, _, zn := s.place(astro.Sun, passage.Add(time.Duration(m)*time.Minute))
		line += fmt.Sprintf(" %+d min %s", m, dm.Bearing(zn))
		if m < 8 {
			line += ","
		}
	}
	return append(words, line)
}
