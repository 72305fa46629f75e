package track

import (
	"fmt"
	"math"
	"sort"
	"time"

	"github.com/soniakeys/unit"
)

// Limits of a passage.
const (
	MaxSpeedKn  = 100.0
	MaxDuration = 400 * 24 * time.Hour
)

// Earliest and Latest bound a passage: the span for which places of the bodies
// are good.
var (
	Earliest = time.Date(1990, 1, 1, 0, 0, 0, 0, time.UTC)
	Latest   = time.Date(2101, 1, 1, 0, 0, 0, 0, time.UTC)
)

// Passage is a line sailed in time: the DR position is known at every instant
// from Departure to Arrival. Make one with [Route.Sail].
type Passage struct {
	Name               string
	Legs               []Leg     // each begins when the one before ends; a stay is one of no length
	Departure, Arrival time.Time // UTC: begin and end, stays at the ends included
	DistanceNM         float64
	starts             []float64 // NM sailed when each leg begins
}

// Fix is the ship's state at an instant by dead reckoning.
type Fix struct {
	Position
	Course  unit.Angle // true, [0°, 360°); in a stay the one on which she came
	SpeedKn float64
	Leg     int // index into Passage.Legs
}

// newPassage joins legs that follow each other in time.
func newPassage(name string, legs []Leg) (*Passage, error) {
	p := &Passage{Name: name, Legs: legs, Departure: legs[0].ETD, Arrival: legs[len(legs)-1].ETA}
	for _, l := range legs {
		p.starts = append(p.starts, p.DistanceNM)
		p.DistanceNM += l.DistanceNM
	}
	if length := p.Arrival.Sub(p.Departure); length > MaxDuration {
		return nil, &Error{
			Place: "passage", Met: fmt.Sprintf("%.0f NM take %.4g days", p.DistanceNM, length.Hours()/24),
			Allowed: fmt.Sprintf("at most %.0f days", MaxDuration.Hours()/24), Hint: "raise the speed or plan the voyage in parts",
		}
	}
	if err := checkTime("arrival", p.Arrival); err != nil {
		return nil, err
	}
	return p, nil
}

func checkTime(place string, t time.Time) error {
	if t.Before(Earliest) || !t.Before(Latest) {
		return &Error{
			Place: place, Met: t.UTC().Format(time.RFC3339),
			Allowed: fmt.Sprintf("%d to %d", Earliest.Year(), Latest.Year()-1), Hint: "check the year",
		}
	}
	return nil
}

func checkSpeed(place string, kn float64) error {
	if !(kn > 0 && kn <= MaxSpeedKn) {
		return &Error{
			Place: place, Met: fmt.Sprintf("%v kn", kn),
			Allowed: fmt.Sprintf("above 0, at most %v kn", MaxSpeedKn), Hint: "give the speed made good in knots with --speed",
		}
	}
	return nil
}

// Ahead makes a passage on one rhumb line from where the ship is, for some time
// at a speed in knots. A ship at rest creeps a metre an hour.
func Ahead(from Position, course unit.Angle, speedKn float64, t time.Time, length time.Duration) (*Passage, error) {
	speedKn = math.Max(speedKn, 1/mileM)
	if err := checkTime("instant", t); err != nil {
		return nil, err
	}
	if err := checkSpeed("speed", speedKn); err != nil {
		return nil, err
	}
	to := rhumbDirect(from, course, speedKn*length.Hours())
	leg := NewLeg(Waypoint{Position: from}, Waypoint{Position: to}, Rhumb)
	leg.Course, leg.SpeedKn = turn(course), speedKn
	leg.ETD, leg.ETA = t.UTC(), t.UTC().Add(length)
	for _, p := range []Position{from, to} {
		if err := checkLatitude("position", p); err != nil {
			return nil, err
		}
	}
	return newPassage("", []Leg{leg})
}

// At gives the DR position, course and speed at an instant; at a waypoint the
// course of the leg that begins there. Before Departure and after Arrival it
// gives the state at that end.
func (p *Passage) At(t time.Time) Fix {
	i, nm := p.onLeg(t)
	pos, course := p.Legs[i].At(nm)
	return Fix{Position: pos, Course: course, SpeedKn: p.Legs[i].SpeedKn, Leg: i}
}

// onLeg is the leg of an instant and how far the ship has come on it, NM.
func (p *Passage) onLeg(t time.Time) (i int, nm float64) {
	i = sort.Search(len(p.Legs)-1, func(i int) bool { return p.Legs[i+1].ETD.After(t) })
	leg := &p.Legs[i]
	return i, math.Min(math.Max(leg.SpeedKn*t.Sub(leg.ETD).Hours(), 0), leg.DistanceNM)
}

// SailedNM is how far the ship has come at an instant, in NM.
func (p *Passage) SailedNM(t time.Time) float64 {
	i, nm := p.onLeg(t)
	return p.starts[i] + nm
}

// UnderWay is the time the passage lasts, stays left out.
func (p *Passage) UnderWay() (d time.Duration) {
	for _, l := range p.Legs {
		if !l.Stays() {
			d += l.ETA.Sub(l.ETD)
		}
	}
	return d
}

func hoursToDuration(h float64) time.Duration {
	return time.Duration(math.Round(h * float64(time.Hour)))
}
