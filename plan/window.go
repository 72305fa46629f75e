package plan

import (
	"sort"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// WindowKind tells what the Sun does in a window.
type WindowKind string

// The kinds of window.
const (
	MorningStars  WindowKind = "morning-stars"  // the Sun rises
	EveningStars  WindowKind = "evening-stars"  // it sinks
	MidnightStars WindowKind = "midnight-stars" // it sinks and turns up again
	MiddayStars   WindowKind = "midday-stars"   // it rises and turns down again
)

// Window is a span of time in which star sights can be taken.
type Window struct {
	ID               string // ship's date at Begin, and kind; the same when the passage is planned again
	Kind             WindowKind
	Begin, End, Best time.Time    // UTC
	Fix              track.Fix    // the ship at Best
	SunAzimuth       unit.Angle   // at Best
	Bodies           []Candidate  // at Best, by azimuth
	Triads           []Triad      // the best first
	Usable           [2]time.Time // UTC: from the third body that can be shot until fewer than three can; zero where never
	Warnings         []string     // bodies near the Moon or each other, a moonlit horizon
	Round            []RoundSight // in order
	RoundFix         FixQuality
	PairFix          FixQuality // of the two best bodies; no Bodies where there are none
}

// shortestWindow is the length under which a window is none: a passage may begin
// or end as the Sun crosses a limit.
const shortestWindow = time.Second

// windows finds every maximal span in which the Sun stands between the limits,
// cut to the passage.
func (s *sky) windows(set Settings) []Window {
	p := s.passage
	marks := []time.Time{p.Departure, p.Arrival}
	for _, level := range []unit.Angle{set.UpperSun, set.LowerSun} {
		for _, c := range s.sunCrossings(level) {
			marks = append(marks, c.time)
		}
	}
	sort.Slice(marks, func(i, j int) bool { return marks[i].Before(marks[j]) })
	best := s.sunCrossings(bestSun)
	var all []Window
	for i := 1; i < len(marks); i++ {
		begin, end := marks[i-1], marks[i]
		if end.Sub(begin) < shortestWindow {
			continue
		}
		if h := s.altitude(astro.Sun, middle(begin, end)); h > set.UpperSun || h < set.LowerSun {
			continue
		}
		w := Window{Kind: s.kind(begin, end), Begin: begin, End: end, Best: bestOf(begin, end, best)}
		w.Fix = p.At(w.Best)
		all = append(all, w)
	}
	return all
}

// kind goes by the way the Sun moves at the two ends of a window.
func (s *sky) kind(begin, end time.Time) WindowKind {
	probe := end.Sub(begin) / 500
	sunAt := func(t time.Time) unit.Angle { return s.altitude(astro.Sun, t) }
	rises := [2]bool{sunAt(begin.Add(probe)) > sunAt(begin), sunAt(end) > sunAt(end.Add(-probe))}
	return map[[2]bool]WindowKind{
		{true, true}: MorningStars, {false, false}: EveningStars,
		{false, true}: MidnightStars, {true, false}: MiddayStars,
	}[rises]
}

// bestOf is the first of the instants given that lies in the span, or the
// span's middle where none does.
func bestOf(begin, end time.Time, instants []crossing) time.Time {
	i := sort.Search(len(instants), func(i int) bool { return !instants[i].time.Before(begin) })
	if i < len(instants) && !instants[i].time.After(end) {
		return instants[i].time
	}
	return middle(begin, end)
}

func middle(a, b time.Time) time.Time { return a.Add(b.Sub(a) / 2) }

// nameWindows gives each window its ID: ship's date and kind, numbered from
// the second of a kind on a date.
func nameWindows(windows []Window, clock *track.Clock) {
	seen := map[string]int{}
	for i := range windows {
		w := &windows[i]
		w.ID = numbered(seen, clock.Day(w.Begin).Date.Format(time.DateOnly)+"-"+string(w.Kind))
	}
}
