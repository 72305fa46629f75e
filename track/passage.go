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

// Earliest and Latest bound the departure: the span for which places of the
// bodies are good.
var (
	Earliest = time.Date(1990, 1, 1, 0, 0, 0, 0, time.UTC)
	Latest   = time.Date(2100, 1, 1, 0, 0, 0, 0, time.UTC)
)

// Passage is a route with a departure time and a speed: the DR position is
// known at every instant from Departure to Arrival.
type Passage struct {
	Name               string
	Legs               []Leg
	Departure, Arrival time.Time
	SpeedKn            float64
	DistanceNM         float64
	starts             []float64 // distance sailed at each leg's start
}

// Fix is the ship's state at an instant by dead reckoning.
type Fix struct {
	Position
	Course  unit.Angle // true, [0°, 360°)
	SpeedKn float64
	Leg     int // index into Passage.Legs
}

// Sail makes a passage of the route: departure in [Earliest, Latest), speed
// in (0, MaxSpeedKn] knots, time under way at most MaxDuration.
func (r *Route) Sail(departure time.Time, speedKn float64, s Sailing) (*Passage, error) {
	if len(r.Waypoints) < 2 {
		return nil, &Error{
			Place: "route", Met: fmt.Sprintf("%d waypoint(s)", len(r.Waypoints)),
			Allowed: "two or more", Hint: "give the route from departure to arrival",
		}
	}
	if err := checkDeparture(departure); err != nil {
		return nil, err
	}
	if err := checkSpeed(speedKn); err != nil {
		return nil, err
	}
	p := &Passage{Name: r.Name, Departure: departure.UTC(), SpeedKn: speedKn}
	for i := 1; i < len(r.Waypoints); i++ {
		leg := NewLeg(r.Waypoints[i-1], r.Waypoints[i], s)
		p.starts = append(p.starts, p.DistanceNM)
		p.DistanceNM += leg.DistanceNM
		p.Legs = append(p.Legs, leg)
	}
	hours := p.DistanceNM / speedKn
	if hours > MaxDuration.Hours() {
		return nil, &Error{
			Place: "passage", Met: fmt.Sprintf("%.0f NM at %v kn take %.4g days", p.DistanceNM, speedKn, hours/24),
			Allowed: fmt.Sprintf("at most %.0f days", MaxDuration.Hours()/24), Hint: "raise the speed or plan the voyage in parts",
		}
	}
	p.Arrival = p.Departure.Add(hoursToDuration(hours))
	return p, nil
}

// boundaryNM is how little before a waypoint the ship counts as having reached
// it: more than speed times the nanosecond to which an ETD is rounded.
const boundaryNM = 1e-9

func checkDeparture(t time.Time) error {
	if t.Before(Earliest) || !t.Before(Latest) {
		return &Error{
			Place: "departure", Met: t.Format(time.RFC3339),
			Allowed: fmt.Sprintf("%d to %d", Earliest.Year(), Latest.Year()), Hint: "check the year",
		}
	}
	return nil
}

func checkSpeed(kn float64) error {
	if !(kn > 0 && kn <= MaxSpeedKn) {
		return &Error{
			Place: "speed", Met: fmt.Sprintf("%v kn", kn),
			Allowed: fmt.Sprintf("above 0, at most %v kn", MaxSpeedKn), Hint: "give the speed made good in knots with --speed",
		}
	}
	return nil
}

// Ahead makes a passage on one rhumb line from where the ship is, for some time
// at a speed in knots. A ship at rest creeps a metre an hour.
func Ahead(from Position, course unit.Angle, speedKn float64, t time.Time, length time.Duration) (*Passage, error) {
	speedKn = math.Max(speedKn, 1/mileM)
	if err := checkDeparture(t); err != nil {
		return nil, err
	}
	if err := checkSpeed(speedKn); err != nil {
		return nil, err
	}
	to := rhumbDirect(from, course, speedKn*length.Hours())
	leg := NewLeg(Waypoint{Position: from}, Waypoint{Position: to}, Rhumb)
	leg.Course = turn(course)
	for _, p := range []Position{from, to} {
		if err := checkLatitude("position", p); err != nil {
			return nil, err
		}
	}
	return &Passage{
		Legs: []Leg{leg}, Departure: t.UTC(), Arrival: t.UTC().Add(length), SpeedKn: speedKn,
		DistanceNM: leg.DistanceNM, starts: []float64{0},
	}, nil
}

// At gives the DR position, course and speed at an instant; at a waypoint the
// course of the leg that begins there. Before Departure and after Arrival it
// gives the state at that end.
func (p *Passage) At(t time.Time) Fix {
	nm := p.SpeedKn * t.Sub(p.Departure).Hours()
	nm = math.Min(math.Max(nm, 0), p.DistanceNM)
	i := sort.Search(len(p.starts), func(i int) bool { return p.starts[i] > nm+boundaryNM }) - 1
	leg := &p.Legs[i]
	pos, course := leg.At(math.Min(math.Max(nm-p.starts[i], 0), leg.DistanceNM))
	return Fix{Position: pos, Course: course, SpeedKn: p.SpeedKn, Leg: i}
}

// ETD is the time at which leg i begins; ETD(len(Legs)) is the arrival.
func (p *Passage) ETD(i int) time.Time {
	if i == len(p.Legs) {
		return p.Arrival
	}
	return p.Departure.Add(hoursToDuration(p.starts[i] / p.SpeedKn))
}

func hoursToDuration(h float64) time.Duration {
	return time.Duration(math.Round(h * float64(time.Hour)))
}
