package calendars

import (
	"fmt"
	"io"
	"slices"
	"strings"
	"time"
)

// ChangeKind says what became of an event.
type ChangeKind string

// The kinds of change.
const (
	Moved   ChangeKind = "moved"   // to another time
	Altered ChangeKind = "altered" // other bodies, presets or words at the same time
	Gained  ChangeKind = "gained"
	Lost    ChangeKind = "lost"
	Back    ChangeKind = "back" // was lost and is there again
)

// Change is one event that an update has changed.
type Change struct {
	Kind        ChangeKind
	Title       string
	Begin, End  time.Time    // UTC; of one lost, as it was
	Before      [2]time.Time // begin and end before; zero where it was not there or its times were not known
	OtherBodies bool         // in the best triad or the round
}

// Changes are those of one update.
type Changes []Change

// note adds what becomes of an event.
func (u *update) note(kind ChangeKind, event *part, was, now state) {
	c := Change{Kind: kind, Title: clean(event.text("SUMMARY")), Begin: now.begin, End: now.end, Before: [2]time.Time{was.begin, was.end}}
	if kind == Lost {
		c.Begin, c.End = was.begin, was.end
	}
	c.OtherBodies = !was.begin.IsZero() && !now.begin.IsZero() && was.otherBodies(now)
	u.changes = append(u.changes, c)
}

func (all Changes) inOrder() Changes {
	slices.SortStableFunc(all, func(a, b Change) int { return a.Begin.Compare(b.Begin) })
	return all
}

// WriteText prints the changes for a person, a line each and one for the old
// time where there was another; shipTime gives an instant by the ship's clock.
func (all Changes) WriteText(w io.Writer, shipTime func(time.Time) time.Time) error {
	var b strings.Builder
	b.WriteString("\nCHANGES IN THE CALENDAR\n")
	if len(all) == 0 {
		b.WriteString("None that a person would notice.\n")
	}
	for _, c := range all {
		fmt.Fprintf(&b, "%-8s %s ship, %s UTC  %s\n", c.Kind, shipTime(c.Begin).Format("02 Jan 15:04"), c.Begin.Format("02 15:04"), shortened(c.Title))
		if c.Kind == Moved {
			fmt.Fprintf(&b, "         before: %s to %s UTC, now %s to %s\n", c.Before[0].Format("02 15:04"), c.Before[1].Format("15:04"), c.Begin.Format("02 15:04"), c.End.Format("15:04"))
		}
		if c.OtherBodies {
			b.WriteString("         other bodies in the best triad or the round\n")
		}
	}
	_, err := io.WriteString(w, b.String())
	return err
}

// shortened keeps a title to what fits a line.
func shortened(title string) string {
	const room = 36
	if r := []rune(title); len(r) > room {
		return string(r[:room-3]) + "..."
	}
	return title
}
