package plan

import (
	"runtime"
	"sort"
	"time"

	"golang.org/x/sync/errgroup"

	"gloam/track"
)

// Plan is the plan of a voyage's sights.
type Plan struct {
	Passage  *track.Passage
	Clock    *track.Clock
	Settings Settings
	Days     []Day    // ship's days with their events and windows
	Notes    []string // what the user should know of the input
}

// New plans the sights of a passage. The error tells a setting out of range.
func New(p *track.Passage, set Settings) (*Plan, error) {
	if err := set.Validate(); err != nil {
		return nil, err
	}
	s := newSky(p, set.DeltaT)
	clock := track.NewClock(p, set.ShipTime)
	windows := s.windows(set)
	nameWindows(windows, clock)
	var group errgroup.Group
	group.SetLimit(runtime.GOMAXPROCS(0))
	for i := range windows {
		group.Go(func() error {
			s.fill(&windows[i], &set)
			return nil
		})
	}
	events := s.events()
	_ = group.Wait() // none fails
	return &Plan{Passage: p, Clock: clock, Settings: set, Days: s.days(clock, set, events, windows)}, nil
}

// Windows gives the windows of all days in order.
func (p *Plan) Windows() []Window {
	var all []Window
	for _, d := range p.Days {
		all = append(all, d.Windows...)
	}
	return all
}

// Events gives the events of all days in order.
func (p *Plan) Events() []Event {
	var all []Event
	for _, d := range p.Days {
		all = append(all, d.Events...)
	}
	return all
}

// EventsBetween gives the events from one instant to another, in order.
func (p *Plan) EventsBetween(from, to time.Time) []Event {
	var all []Event
	first := sort.Search(len(p.Days), func(i int) bool { return p.Days[i].To.After(from) })
	for _, d := range p.Days[first:] {
		for _, e := range d.Events {
			if !e.Time.Before(from) && !e.Time.After(to) {
				all = append(all, e)
			}
		}
		if d.To.After(to) {
			break
		}
	}
	return all
}
