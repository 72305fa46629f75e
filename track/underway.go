package track

import (
	"fmt"
	"math"
	"time"
)

// UnderWay is where a ship is that has left. Zero fields leave it to the
// passage.
type UnderWay struct {
	Time     time.Time     // now
	Position *Position     // where she is; nil for where she would have been Late ago
	Late     time.Duration // how far she is behind
	SpeedKn  float64       // from here on; 0 for the speeds planned
	History  bool          // keep what the passage had before Time
}

// Rejoin plans the rest of a passage anew from where the ship is: to the next
// waypoint and on, stays kept, at the speeds planned or at one. From a position
// she makes for the end of the leg that lies nearest; offNM is how far off that
// is. Without a time the whole passage is late.
func (p *Passage) Rejoin(u UnderWay) (_ *Passage, offNM float64, err error) {
	if u.Time.IsZero() {
		u.Time = p.Departure.Add(u.Late)
	}
	if err := u.check(p); err != nil {
		return nil, 0, err
	}
	rest, offNM := p.rest(u)
	if len(rest) == 0 {
		return nil, 0, &Error{"position", "at the end of the route", "on the way there", "nothing is left to plan"}
	}
	var legs []Leg
	if u.History {
		legs = p.until(u.Time)
	}
	at := u.Time.UTC()
	for _, l := range rest {
		if u.SpeedKn > 0 && !l.Stays() {
			l.SpeedKn = u.SpeedKn
		}
		lasts := l.ETA.Sub(l.ETD)
		if !l.Stays() {
			lasts = l.lasts()
		}
		l.ETD, l.ETA = at, at.Add(lasts)
		at = l.ETA
		legs = append(legs, l)
	}
	joined, err := newPassage(p.Name, legs)
	return joined, offNM, err
}

func (u *UnderWay) check(p *Passage) error {
	end := p.Arrival.Add(u.Late)
	if u.Position == nil && (u.Time.Before(p.Departure) || !u.Time.Before(end)) {
		return &Error{"time", timeText(u.Time), fmt.Sprintf("within the passage, %s to %s", timeText(p.Departure), timeText(end)), "give the position too, or another time"}
	}
	if u.SpeedKn != 0 {
		if err := checkSpeed("speed", u.SpeedKn); err != nil {
			return err
		}
	}
	if u.Position != nil {
		if err := checkLatitude("position", *u.Position); err != nil {
			return err
		}
	}
	return checkTime("time", u.Time)
}

// rest are the legs still to sail, the first cut to what is left of it.
func (p *Passage) rest(u UnderWay) (rest []Leg, offNM float64) {
	if u.Position == nil {
		at := u.Time.Add(-u.Late)
		i := p.At(at).Leg
		return p.from(i, p.Legs[i].after(at)), 0
	}
	i, offNM := p.nearest(*u.Position)
	first := NewLeg(Waypoint{Position: *u.Position}, p.Legs[i].To, p.Legs[i].Sailing)
	first.SpeedKn = p.Legs[i].SpeedKn
	return p.from(i, first), offNM
}

// from is a first leg, unless it has no length, and those after leg i.
func (p *Passage) from(i int, first Leg) []Leg {
	rest := p.Legs[i+1:]
	if first.Stays() && first.ETA.After(first.ETD) || first.DistanceNM > repeatNM {
		rest = append([]Leg{first}, rest...)
	}
	return rest
}

// until are the legs before an instant, the last cut there.
func (p *Passage) until(t time.Time) []Leg {
	var legs []Leg
	for _, l := range p.Legs {
		if l.ETA.After(t) {
			if l = l.before(t); !l.ETA.After(l.ETD) {
				return legs
			}
			return append(legs, l)
		}
		legs = append(legs, l)
	}
	return legs
}

// after is what an instant leaves of a leg; before, what it had.
func (l Leg) after(t time.Time) Leg {
	if !t.After(l.ETD) {
		return l
	}
	if l.Stays() {
		l.ETD = t
		return l
	}
	return l.part(Waypoint{Position: l.place(t)}, l.To, t, l.ETA)
}

func (l Leg) before(t time.Time) Leg {
	t = later(t, l.ETD)
	if l.Stays() {
		l.ETA = t
		return l
	}
	return l.part(l.From, Waypoint{Position: l.place(t)}, l.ETD, t)
}

func (l *Leg) place(t time.Time) Position {
	at, _ := l.At(math.Min(l.SpeedKn*t.Sub(l.ETD).Hours(), l.DistanceNM))
	return at
}

func (l *Leg) part(from, to Waypoint, begin, end time.Time) Leg {
	part := NewLeg(from, to, l.Sailing)
	part.SpeedKn, part.ETD, part.ETA = l.SpeedKn, begin, end
	return part
}

// nearest is the leg sailed that comes closest to a place, of equals the last,
// and how close.
func (p *Passage) nearest(place Position) (leg int, nm float64) {
	nm = math.Inf(1)
	for i := range p.Legs {
		if l := &p.Legs[i]; !l.Stays() {
			if d := l.distanceTo(place); d < nm+repeatNM {
				leg, nm = i, math.Min(d, nm)
			}
		}
	}
	return leg, nm
}

// distanceTo is the least distance of a place from the leg, found by thirds: it
// falls towards the nearest point and grows beyond it.
func (l *Leg) distanceTo(place Position) float64 {
	d := func(nm float64) float64 {
		at, _ := l.At(nm)
		leg := NewLeg(Waypoint{Position: at}, Waypoint{Position: place}, GreatCircle)
		return leg.DistanceNM
	}
	a, b := 0.0, l.DistanceNM
	for b-a > 0.001 {
		third := (b - a) / 3
		if d(a+third) < d(b-third) {
			b -= third
		} else {
			a += third
		}
	}
	return math.Min(d((a+b)/2), math.Min(d(0), d(l.DistanceNM)))
}
