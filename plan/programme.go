package plan

import (
	"cmp"
	"fmt"
	"runtime"
	"slices"
	"strings"
	"time"

	"golang.org/x/sync/errgroup"

	"gloam/track"
)

// ItemKind says what an item of the day's programme is about.
type ItemKind string

// The kinds of item, in the order in which they are listed.
const (
	Stars       ItemKind = "stars"        // a star window with its round
	Noon        ItemKind = "noon"         // the Sun on the meridian
	SunLines    ItemKind = "sun-lines"    // the two lines of a running fix
	MoonLines   ItemKind = "moon-lines"   // Moon and Sun by day
	PlanetLines ItemKind = "planet-lines" // Venus by day
	Compass     ItemKind = "compass"      // bearings to check the compass by
	Daily       ItemKind = "daily"        // the day's rising, setting and twilights
	Moonlit     ItemKind = "moonlit"      // stars over a horizon under the Moon
)

// ItemKinds are all kinds.
var ItemKinds = []ItemKind{Stars, Noon, SunLines, MoonLines, PlanetLines, Compass, Daily, Moonlit}

// UsualKinds are all kinds but moonlit, which is for those who ask for it.
var UsualKinds = ItemKinds[:len(ItemKinds)-1]

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
	Window           *Window      // of kinds stars and moonlit, else nil
	Sights           []RoundSight // each at its own time and place
	Checks           []Check      // of kind compass
	ExpectedNM       float64      // of the fix or line this gives; 0 where it gives none
	Quality          *FixQuality  // of the fix, nil where it gives none
	Words            []string     // what to do, what comes of it, what to mind
}

// programmes gives each day its light, its Moon and its programme.
func (s *sky) programmes(days []Day, set Settings, clock *track.Clock) {
	if slices.Contains(set.Kinds, Compass) {
		s.sunCrossings(0) // searched once, before the days ask for it at the same time
	}
	var group errgroup.Group
	group.SetLimit(runtime.GOMAXPROCS(0))
	for i := range days {
		group.Go(func() error {
			d := &days[i]
			d.Moon, d.Light, d.MoonUp = s.moonPhase(d.From, d.To), s.light(d), s.moonUp(d)
			d.Programme = s.programme(d, &set, clock)
			return nil
		})
	}
	_ = group.Wait() // none fails
	nameItems(days)
}

// programme lists what a day has of the kinds asked for, in order of time.
func (s *sky) programme(d *Day, set *Settings, clock *track.Clock) []Item {
	t := s.sunTable(d, set)
	defer t.free()
	var items []Item
	for _, part := range []struct {
		kind ItemKind
		find func() []Item
	}{
		{Daily, func() []Item { return s.daily(d, clock) }},
		{Stars, d.stars},
		{Noon, func() []Item { return s.noons(d, set) }},
		{SunLines, func() []Item { return t.sunLines(d, clock) }},
		{MoonLines, t.moonLines},
		{PlanetLines, t.planetLines},
		{Compass, func() []Item { return s.compass(d, t, clock) }},
		{Moonlit, t.moonlit},
	} {
		if slices.Contains(set.Kinds, part.kind) {
			items = append(items, part.find()...)
		}
	}
	slices.SortStableFunc(items, func(a, b Item) int { return a.Best.Compare(b.Best) })
	return items
}

// stars are the day's star windows.
func (d *Day) stars() (items []Item) {
	for i := range d.Windows {
		items = append(items, d.Windows[i].item())
	}
	return items
}

// item is a star window as one of the programme.
func (w *Window) item() Item {
	item := Item{
		Kind: Stars, ID: w.ID, Title: w.Title(), Begin: w.Begin, Best: w.Best, End: w.End, Fix: w.Fix,
		Window: w, Sights: w.Round, Words: append([]string{}, w.Warnings...),
	}
	if len(w.RoundFix.Bodies) > 1 {
		item.Quality, item.ExpectedNM = &w.RoundFix, finite(w.RoundFix.Covariance.ExpectedError())
	}
	return item
}

// Title is the window's kind with the bodies of the best triad, or with what
// the window lacks: "Evening stars: Rigel, Schedar, Fomalhaut".
func (w *Window) Title() string {
	kind := Capital(w.Kind.Words())
	if len(w.Triads) > 0 {
		return kind + ": " + w.Triads[0].Names()
	}
	return kind + ": " + w.Comment()
}

// Capital begins words with a capital letter; they begin with a letter of ASCII.
func Capital(words string) string { return strings.ToUpper(words[:1]) + words[1:] }

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

// nameItems gives each item its ID: ship's date and kind, numbered from the
// second of a kind on a date. Those of windows have one.
func nameItems(days []Day) {
	seen := map[string]int{}
	for _, d := range days {
		for i := range d.Programme {
			item := &d.Programme[i]
			if item.Kind != Stars {
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
