package track

import (
	"fmt"
	"time"
)

// Mark is a place of the passage worth a point on a map: an hourly DR position
// or what others add.
type Mark struct {
	Kind        string    // "dr" for a DR position
	Title, Text string    // a line, and more
	Time        time.Time // UTC
	Position
}

// HourlyMarks are the DR positions at full hours of UTC, and at both ends.
func (p *Passage) HourlyMarks() []Mark {
	times := []time.Time{p.Departure}
	for t := p.Departure.Truncate(time.Hour).Add(time.Hour); t.Before(p.Arrival); t = t.Add(time.Hour) {
		times = append(times, t)
	}
	var marks []Mark
	for _, t := range append(times, p.Arrival) {
		fix := p.At(t)
		text := fmt.Sprintf("course %03.0f, %.1f kn", fix.Course.Deg(), fix.SpeedKn)
		marks = append(marks, Mark{"dr", t.Format("DR 2006-01-02 15:04 UTC"), text, t, fix.Position})
	}
	return marks
}

// calls are the passage's waypoints in order, each with the times at which it is
// reached and left, equal where the ship does not stay, and with the leg that
// ends there; those at the ends have their one time twice.
type call struct {
	Waypoint
	reached, left time.Time
	leg           *Leg // nil at the start
}

func (p *Passage) calls() []call {
	calls := []call{{Waypoint: p.Legs[0].From, reached: p.Departure, left: p.Departure}}
	for i := range p.Legs {
		l := &p.Legs[i]
		if l.Stays() {
			calls[len(calls)-1].left = l.ETA
			continue
		}
		if last := calls[len(calls)-1]; !near(last.Position, l.From.Position, repeatNM) {
			calls = append(calls, call{l.From, l.ETD, l.ETD, nil}) // where a ship under way was found to be
		}
		calls = append(calls, call{l.To, l.ETA, l.ETA, l})
	}
	return calls
}
