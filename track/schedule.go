package track

import (
	"fmt"
	"math"
	"time"
)

// How far times and speeds of one file may differ: what rounding makes of
// either.
const (
	sameTime    = time.Minute
	sameSpeedKn = 0.1
)

// Sail makes a passage of the route. Its times lie in [Earliest, Latest), its
// speeds in (0, MaxSpeedKn] knots, and it lasts at most MaxDuration. Speeds not
// given follow from the times between which they lie; what is given twice must
// agree, to a minute or a tenth of a knot, and then the times count. A stay is
// a leg of no length. Errors are of type *[Error].
func (r *Route) Sail(o Orders) (*Passage, error) {
	if err := o.check(); err != nil {
		return nil, err
	}
	if len(r.Waypoints) < 2 {
		return nil, &Error{
			Place: "route", Met: fmt.Sprintf("%d waypoint(s)", len(r.Waypoints)),
			Allowed: "two or more", Hint: "give the route from departure to arrival",
		}
	}
	s := schedule{route: r, points: r.ordered(o), sailing: r.Sailing}
	if o.Sailing != nil {
		s.sailing = o.Sailing
	}
	s.makeLegs(r.SpeedKn, o)
	if err := s.checkGiven(); err != nil {
		return nil, err
	}
	start, err := s.start()
	if err != nil {
		return nil, err
	}
	if err := s.run(start); err != nil {
		return nil, err
	}
	return newPassage(r.Name, s.sailed)
}

// schedule turns a route's waypoints into legs that follow each other in time.
type schedule struct {
	route   *Route
	points  []Waypoint
	sailing *Sailing
	legs    []Leg // one from each waypoint to the next; SpeedKn 0 where it is to follow
	sailed  []Leg // stays among them
}

func (s *schedule) makeLegs(speedKn float64, o Orders) {
	if o.SpeedKn != 0 || !o.Arrival.IsZero() {
		speedKn = o.SpeedKn
	}
	for i := 1; i < len(s.points); i++ {
		to, how := s.points[i], Rhumb
		switch {
		case o.Sailing == nil && to.Sailing != nil:
			how = *to.Sailing
		case s.sailing != nil:
			how = *s.sailing
		}
		leg := NewLeg(s.points[i-1], to, how)
		if leg.SpeedKn = to.SpeedKn; leg.SpeedKn == 0 {
			leg.SpeedKn = speedKn
		}
		s.legs = append(s.legs, leg)
	}
}

// checkGiven checks the speeds and stays given and the agreement of each
// waypoint's own times.
func (s *schedule) checkGiven() error {
	for i, l := range s.legs {
		if l.SpeedKn != 0 {
			if err := checkSpeed(s.place(i+1), l.SpeedKn); err != nil {
				return err
			}
		}
	}
	for i := range s.points {
		w := &s.points[i]
		stay := w.ETD.Sub(w.ETA)
		switch {
		case w.Stay < 0:
			return s.refuse(i, fmt.Sprintf("a stay of %v", w.Stay), "0 or more")
		case w.ETA.IsZero() || w.ETD.IsZero():
		case stay < 0:
			return s.refuse(i, fmt.Sprintf("left %s, before it is reached %s", timeText(w.ETD), timeText(w.ETA)), "the times in order")
		case w.Stay != 0 && (stay-w.Stay).Abs() > sameTime:
			return s.refuse(i, fmt.Sprintf("a stay of %v, and of %v by its times", w.Stay, stay), "the two to agree")
		}
	}
	return nil
}

// start is when the first waypoint is reached, and the passage begins: by its
// own times, or else backwards from the first time known.
func (s *schedule) start() (time.Time, error) {
	if s.points[0].timed() {
		return s.points[0].arrival(), nil
	}
	before := s.points[0].Stay
	for i := range s.legs {
		to := &s.points[i+1]
		if s.legs[i].SpeedKn == 0 {
			break
		}
		before += s.legs[i].lasts()
		if to.timed() {
			return to.arrival().Add(-before), nil
		}
		before += to.Stay
	}
	return time.Time{}, &Error{"departure", "missing", "RFC 3339, as 2026-11-20T12:00:00Z", "give --depart, or the property departure of the line"}
}

// run fits and walks the sections between waypoints with times.
func (s *schedule) run(start time.Time) error {
	if err := checkTime(s.place(0), start); err != nil {
		return err
	}
	left := s.stay(0, start)
	for from := 0; from < len(s.legs); {
		to := from + 1
		for to < len(s.legs) && !s.points[to].timed() {
			to++
		}
		if err := s.fit(from, to, left); err != nil {
			return err
		}
		for i := from; i < to; i++ {
			leg := s.legs[i]
			leg.ETD, leg.ETA = left, left.Add(leg.lasts())
			if i+1 == to && s.points[to].timed() {
				leg.ETA = s.points[to].arrival()
			}
			s.sailed = append(s.sailed, leg)
			left = s.stay(i+1, leg.ETA)
		}
		from = to
	}
	return nil
}

// stay adds the leg of no length in which the ship lies at a waypoint, and
// gives when she leaves.
func (s *schedule) stay(i int, reached time.Time) time.Time {
	w := s.points[i]
	left := w.departure(reached)
	if left.After(reached) {
		lie := Leg{From: w, To: w, ETD: reached, ETA: left}
		if lie.Course = s.legs[max(i-1, 0)].Course; i > 0 {
			_, lie.Course = s.legs[i-1].At(s.legs[i-1].DistanceNM)
		}
		s.sailed = append(s.sailed, lie)
	}
	return left
}

// fit gives the legs from one waypoint to another their speeds, so that the
// ship, having left at an instant, is there by the time that one has.
func (s *schedule) fit(from, to int, left time.Time) error {
	free, given := 0.0, time.Duration(0) // miles without a speed; time the others take
	for i := from; i < to; i++ {
		if i > from {
			given += s.points[i].Stay
		}
		if s.legs[i].SpeedKn == 0 {
			free += s.legs[i].DistanceNM
		} else {
			given += s.legs[i].lasts()
		}
	}
	if !s.points[to].timed() {
		if free > 0 {
			return s.missingSpeed(from, to)
		}
		return nil
	}
	due := s.points[to].arrival()
	rest := due.Sub(left.Add(given))
	switch {
	case !due.After(left):
		return s.refuse(to, fmt.Sprintf("reached %s, when %s is left %s", timeText(due), s.place(from), timeText(left)), "times in order")
	case free > 0 && free <= MaxSpeedKn*rest.Hours():
		s.setSpeeds(from, to, func(kn float64) float64 {
			if kn == 0 {
				return free / rest.Hours()
			}
			return kn
		})
		return nil
	case free > 0 && rest > 0:
		return s.refuse(to, fmt.Sprintf("%.1f NM left for %.2g h", free, rest.Hours()), fmt.Sprintf("at most %v kn", MaxSpeedKn))
	case free > 0:
		return s.refuse(to, fmt.Sprintf("reached %s by its time, not before %s by the speeds and stays", timeText(due), timeText(left.Add(given))), "the two to agree")
	}
	return s.agree(from, to, left, left.Add(given), due)
}

// agree sees that speeds given bring the ship to a waypoint when its time
// says, and adapts them by what is left.
func (s *schedule) agree(from, to int, left, reached, due time.Time) error {
	lies := time.Duration(0)
	for i := from + 1; i < to; i++ {
		lies += s.points[i].Stay
	}
	factor := float64(reached.Sub(left)-lies) / float64(due.Sub(left)-lies)
	same := reached.Sub(due).Abs() <= sameTime
	if !same {
		same = factor > 0
		for _, l := range s.legs[from:to] {
			same = same && math.Abs(l.SpeedKn*factor-l.SpeedKn) <= sameSpeedKn
		}
	}
	if !same || factor <= 0 {
		return s.refuse(to, fmt.Sprintf("reached %s by its time, %s by the speeds", timeText(due), timeText(reached)),
			fmt.Sprintf("the two to agree within a minute or %v kn", sameSpeedKn))
	}
	s.setSpeeds(from, to, func(kn float64) float64 { return kn * factor })
	return nil
}

func (s *schedule) setSpeeds(from, to int, f func(float64) float64) {
	for i := from; i < to; i++ {
		s.legs[i].SpeedKn = f(s.legs[i].SpeedKn)
	}
}

func (s *schedule) missingSpeed(from, to int) error {
	for i := from; i < to; i++ {
		if s.legs[i].SpeedKn == 0 {
			from = i
			break
		}
	}
	met := "missing"
	if len(s.legs) > 1 {
		met = "missing on the leg to " + s.place(from+1)
	}
	return &Error{"speed", met, "knots", "give --speed or --arrive, or the property speed_kn of the line"}
}

// place names a waypoint in an error.
func (s *schedule) place(i int) string {
	if name := s.points[i].Name; name != "" {
		return fmt.Sprintf("waypoint %d (%s)", i+1, name)
	}
	return fmt.Sprintf("waypoint %d", i+1)
}

func (s *schedule) refuse(i int, met, allowed string) error {
	return &Error{s.place(i), met, allowed, "mend the times or speeds in the file, or give --depart with --speed, which win over it"}
}

func timeText(t time.Time) string { return t.UTC().Format("2006-01-02 15:04 UTC") }
