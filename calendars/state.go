package calendars

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"time"
)

// The properties in which an event keeps what it was when it was written: what
// a person would notice of it, and a hash of its text, by which an edited one is
// known.
const (
	stateProperty = "X-GLOAM-STATE"
	textProperty  = "X-GLOAM-TEXT"
)

// These mark alarms that are gloam's own, and events that gloam has cancelled,
// not a person.
const (
	alarmProperty  = "X-GLOAM-ALARM"
	cancelProperty = "X-GLOAM-CANCELLED"
)

// state is what a person would notice of an event.
type state struct {
	begin, best, end time.Time
	offset           time.Duration
	triad            string             // names of the best triad
	sights           map[string]float64 // preset of each body of the round, minutes
	first            time.Time          // of the round's first sight
	order            []string           // the bodies as they come in sights
	words            string             // hash of the text, figures and names left out
}

func (e *entry) state() state {
	s := state{begin: e.start(), best: e.start(), end: e.finish(), offset: e.offset, sights: map[string]float64{}, words: shortHash(wordsOnly(e.description))}
	if e.item == nil {
		return s
	}
	if e.allDay { // its times stand in the text alone
		s.words = shortHash(e.description)
	}
	s.best = whole(e.item.Best)
	if w := e.item.Window; w != nil && len(w.Triads) > 0 {
		s.triad = w.Triads[0].Names()
	}
	if len(e.item.Sights) > 0 {
		s.first = whole(e.item.Sights[0].Time)
	}
	for _, r := range e.item.Sights {
		name := r.Label()
		s.sights[name] = r.Preset.Min()
		s.order = append(s.order, name)
	}
	return s
}

// wordsOnly is a text without what other fields of a state hold: numbers, and
// the lines that name bodies.
func wordsOnly(text string) string {
	var b strings.Builder
	for l := range strings.Lines(text) {
		if strings.HasPrefix(l, "Best: ") || strings.Contains(l, " Zn ") {
			continue
		}
		for _, r := range l {
			if r < '0' || r > '9' {
				b.WriteRune(r)
			}
		}
	}
	return b.String()
}

const stateTime = "20060102T150405Z"

// String writes the state in one line without characters that a calendar would
// escape: fields with bars between them.
func (s state) String() string {
	var sights []string
	for _, name := range s.order {
		sights = append(sights, fmt.Sprintf("%s %.1f", name, s.sights[name]))
	}
	return strings.Join([]string{
		s.begin.Format(stateTime), s.best.Format(stateTime), s.end.Format(stateTime), strconv.Itoa(int(s.offset / time.Minute)),
		strings.ReplaceAll(s.triad, ", ", "+"), strings.Join(sights, "+"), s.words, s.first.Format(stateTime),
	}, "|")
}

// parseState reads what String has written.
func parseState(text string) (s state, ok bool) {
	f := strings.Split(text, "|")
	if len(f) != 8 {
		return s, false
	}
	for i, t := range map[int]*time.Time{0: &s.begin, 1: &s.best, 2: &s.end, 7: &s.first} {
		var err error
		if *t, err = time.Parse(stateTime, f[i]); err != nil {
			return s, false
		}
	}
	minutes, err := strconv.Atoi(f[3])
	s.offset, s.triad, s.words, s.sights = time.Duration(minutes)*time.Minute, strings.ReplaceAll(f[4], "+", ", "), f[6], map[string]float64{}
	for _, sight := range strings.Split(f[5], "+") {
		i := strings.LastIndexByte(sight, ' ')
		if i < 0 {
			continue
		}
		preset, err := strconv.ParseFloat(sight[i+1:], 64)
		if err != nil {
			return s, false
		}
		s.sights[sight[:i]] = preset
		s.order = append(s.order, sight[:i])
	}
	return s, err == nil
}

// What a person notices: a minute of time, 5' of altitude.
const (
	noticedTime  = time.Minute
	noticedAngle = 5.0
)

// moved tells whether times differ by what a person notices.
func (s state) moved(now state) bool {
	return now.begin.Sub(s.begin).Abs() >= noticedTime || now.best.Sub(s.best).Abs() >= noticedTime || now.end.Sub(s.end).Abs() >= noticedTime
}

// otherRound tells whether the round begins at another time, or comes in another
// order.
func (s state) otherRound(now state) bool {
	return now.first.Sub(s.first).Abs() >= noticedTime || !slices.Equal(s.order, now.order)
}

// otherBodies tells whether the best triad or the round have other bodies.
func (s state) otherBodies(now state) bool {
	same := s.triad == now.triad && len(s.sights) == len(now.sights)
	for name := range now.sights {
		_, had := s.sights[name]
		same = same && had
	}
	return !same
}

// differs tells whether a person would notice anything.
func (s state) differs(now state) bool {
	if s.moved(now) || s.otherBodies(now) || s.otherRound(now) || s.offset != now.offset || s.words != now.words {
		return true
	}
	for name, preset := range now.sights {
		if math.Abs(preset-s.sights[name]) >= noticedAngle {
			return true
		}
	}
	return false
}

// textHash is a hash of an event's text, white space aside, which programs
// change.
func textHash(summary, description string) string {
	var solid []byte
	for _, text := range []string{summary, description} {
		for i := range len(text) {
			if c := text[i]; c > ' ' {
				solid = append(solid, c)
			}
		}
	}
	return shortHash(string(solid))
}
