package track

import "time"

// Timing is what a route file says of a waypoint's time and of the leg that
// ends there; zero where it is silent.
type Timing struct {
	ETA, ETD time.Time     // reached and left; UTC
	Stay     time.Duration // from ETA to ETD
	SpeedKn  float64       // on the leg that ends here
	Sailing  *Sailing      // likewise
}

// Orders are what the bridge decides; zero fields leave it to the file. A
// departure moves the file's whole schedule. A speed or an arrival does away
// with its speeds and with the times after departure, stays excepted.
type Orders struct {
	Departure, Arrival time.Time
	SpeedKn            float64
	Sailing            *Sailing
}

// check sees that the orders keep the limits.
func (o *Orders) check() error {
	if o.SpeedKn != 0 {
		if err := checkSpeed("speed", o.SpeedKn); err != nil {
			return err
		}
	}
	if !o.Departure.IsZero() {
		if err := checkTime("departure", o.Departure); err != nil {
			return err
		}
	}
	if o.Arrival.IsZero() {
		return nil
	}
	return checkTime("arrival", o.Arrival)
}

// arrival is when a waypoint is reached, so far as its timing says.
func (w *Timing) arrival() time.Time {
	if w.ETA.IsZero() && !w.ETD.IsZero() {
		return w.ETD.Add(-w.Stay)
	}
	return w.ETA
}

// departure is when a waypoint reached at an instant is left.
func (w *Timing) departure(reached time.Time) time.Time {
	if w.ETD.IsZero() {
		return reached.Add(w.Stay)
	}
	return w.ETD
}

// timed tells whether the waypoint has a time of its own.
func (w *Timing) timed() bool { return !w.ETA.IsZero() || !w.ETD.IsZero() }

// ordered are the route's waypoints with the orders put in place of their
// timing.
func (r *Route) ordered(o Orders) []Waypoint {
	points := append([]Waypoint(nil), r.Waypoints...)
	first, last := &points[0], &points[len(points)-1]
	if left := first.departure(first.ETA); !o.Departure.IsZero() {
		shift := o.Departure.Sub(left)
		for i := range points {
			points[i].Timing = points[i].moved(shift, !left.IsZero())
		}
		first.ETD = o.Departure.UTC()
	}
	if o.SpeedKn != 0 || !o.Arrival.IsZero() {
		for i := range points[1:] {
			points[i+1].Timing = points[i+1].unhurried()
		}
	}
	if !o.Arrival.IsZero() {
		last.ETA = o.Arrival.UTC()
	}
	return points
}

// moved is the timing with its times shifted, or without them.
func (w Timing) moved(by time.Duration, keep bool) Timing {
	for _, t := range []*time.Time{&w.ETA, &w.ETD} {
		switch {
		case !keep:
			*t = time.Time{}
		case !t.IsZero():
			*t = t.Add(by)
		}
	}
	return w
}

// unhurried is the timing without times and speed, its stay kept.
func (w Timing) unhurried() Timing {
	if !w.ETA.IsZero() && !w.ETD.IsZero() {
		w.Stay = w.ETD.Sub(w.ETA)
	}
	return Timing{Stay: w.Stay, Sailing: w.Sailing}
}

// absorb takes over what is said of the same place once more: the ship has
// stayed until then.
func (w *Waypoint) absorb(again *Waypoint) {
	if w.Name == "" {
		w.Name = again.Name
	}
	if !again.timed() {
		w.Stay += again.Stay
		return
	}
	w.ETD, w.Stay = again.departure(again.ETA), 0
}

// Paced tells whether the file itself says how fast the ship goes.
func (r *Route) Paced() bool {
	paced := r.SpeedKn > 0
	for _, w := range r.Waypoints[1:] {
		paced = paced || w.SpeedKn > 0 || w.timed()
	}
	return paced
}
