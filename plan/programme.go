package plan

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
	"time"

	"gloam/track"
)

// ItemKind says what an item of the day's programme is about.
type ItemKind string

// The kinds of item, in the order in which they are listed.
const (
	Stars ItemKind = "stars" // a star window with its round
	Noon  ItemKind = "noon"  // the Sun on the meridian
	Daily ItemKind = "daily" // the day's rising, setting and twilights
)

// ItemKinds are all kinds.
var ItemKinds = []ItemKind{Stars, Noon, Daily}

// ParseItemKinds reads kinds with commas between them: "stars,noon".
func ParseItemKinds(text string) (kinds []ItemKind, err error) {
	for _, name := range strings.Split(text, ",") {
		k := ItemKind(strings.TrimSpace(name))
		if !slices.Contains(ItemKinds, k) {
			return nil, fmt.Errorf("%q (%s)", name, strings.Join(each(ItemKinds, func(k ItemKind) string { return string(k) }), ", "))
		}
		if !slices.Contains(kinds, k) {
			kinds = append(kinds, k)
		}
	}
	return kinds, nil
}

// Item is one thing worth doing or knowing on a ship's day.
type Item struct {
	Kind             ItemKind
	ID               string       // ship's date and kind, the same when the passage is planned again
	Title            string       // one line, without the time
	Begin, Best, End time.Time    // UTC: be ready from, aim at, over by
	Fix              track.Fix    // the ship at Best
	Window           *Window      // of kind stars, else nil
	Sights           []RoundSight // each at its own time and place
	Words            []string     // what to do, what comes of it, what to mind
}

// programme lists what a day has, in order of time.
func (s *sky) programme(d *Day, clock *track.Clock) []Item {
	items := s.daily(d, clock)
	for i := range d.Windows {
		w := &d.Windows[i]
		items = append(items, Item{Kind: Stars, ID: w.ID, Title: w.Title(), Begin: w.Begin, Best: w.Best, End: w.End, Fix: w.Fix, Window: w, Sights: w.Round})
	}
	for _, e := range d.Events {
		if e.Kind == MeridianPassage {
			items = append(items, s.noon(e))
		}
	}
	slices.SortStableFunc(items, func(a, b Item) int { return a.Best.Compare(b.Best) })
	return items
}

// Title is the window's kind with the bodies of the best triad, or with what
// the window lacks: "Evening stars: Rigel, Schedar, Fomalhaut".
func (w *Window) Title() string {
	kind := capital(w.Kind.Words())
	if len(w.Triads) > 0 {
		return kind + ": " + w.Triads[0].Names()
	}
	return kind + ": " + w.Comment()
}

func capital(words string) string { return strings.ToUpper(words[:1]) + words[1:] }

// daily is the day's rising, setting and twilights, where it has any.
func (s *sky) daily(d *Day, clock *track.Clock) []Item {
	item := Item{Kind: Daily, Begin: d.From, Best: d.From, End: d.To, Fix: s.passage.At(d.From)}
	var first, last string
	for _, e := range d.Events {
		if e.Kind == MeridianPassage {
			continue
		}
		at := clock.At(Minute(e.Time, clock.At))
		item.Words = append(item.Words, fmt.Sprintf("%s ship %s UTC %s", at.Format("15:04"), at.UTC().Format("15:04"), e.Kind.Words()))
		switch e.Kind {
		case Sunrise:
			first = " " + at.Format("15:04")
		case Sunset:
			last = " " + at.Format("15:04")
		}
	}
	if item.Words == nil {
		return nil
	}
	item.Title = "Sun" + cmp.Or(first, " -") + " to" + cmp.Or(last, " -") + " ship"
	return []Item{item}
}

// noonReady is how long before meridian passage to be ready; noonOver how long
// after it the Sun has surely dipped.
const (
	noonReady = 15 * time.Minute
	noonOver  = 5 * time.Minute
)

// noon is the Sun's meridian passage.
func (s *sky) noon(e Event) Item {
	return Item{Kind: Noon, Title: "Sun on the meridian", Begin: e.Time.Add(-noonReady), Best: e.Time, End: e.Time.Add(noonOver), Fix: s.passage.At(e.Time)}
}

// nameItems gives each item its ID: ship's date and kind, numbered from the
// second of a kind on a date. Those of windows have one.
func nameItems(days []Day) {
	seen := map[string]int{}
	for _, d := range days {
		for i := range d.Programme {
			item := &d.Programme[i]
			if item.ID == "" {
				item.ID = numbered(seen, d.Date.Format(time.DateOnly)+"-"+string(item.Kind))
			}
		}
	}
}

// numbered gives a name that has been seen before its number.
func numbered(seen map[string]int, name string) string {
	seen[name]++
	if n := seen[name]; n > 1 {
		return fmt.Sprintf("%s-%d", name, n)
	}
	return name
}
