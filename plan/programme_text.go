package plan

import (
	"fmt"
	"slices"
	"strings"
	"time"
	"unicode/utf8"

	"gloam/track/dm"
)

// programme prints the items of a day that are asked for, in order of time; star
// windows are printed whole elsewhere, so here they have their line only.
func (t *text) programme(d *Day, kinds []ItemKind) {
	var items []*Item
	for i := range d.Programme {
		if item := &d.Programme[i]; item.Kind != Daily && slices.Contains(kinds, item.Kind) {
			items = append(items, item)
		}
	}
	if len(items) == 0 || len(items) == 1 && items[0].Kind == Stars {
		return
	}
	t.line("")
	t.line(" ship   UTC    programme                    set Hs     Zn    bow   error, NM")
	for _, item := range items {
		t.item(item)
	}
}

// item prints an item: its title, a line for each sight where there are more
// than one, and its words.
func (t *text) item(item *Item) {
	const blank = "              "
	lead, error := fmt.Sprintf("%s  %s  ", t.ship(item.Best), t.minute(item.Best).Format("15:04")), ""
	if item.ExpectedNM > 0 {
		error = fmt.Sprintf("%.2f", item.ExpectedNM)
	}
	switch {
	case item.Kind == Stars:
		t.sightLine(lead, item.Window.Kind.Words()+", see below", nil, error)
		return
	case len(item.Sights) == 1:
		t.sightLine(lead, item.Title, &item.Sights[0], error)
	default:
		t.sightLine(lead, item.Title, nil, error)
		for i := range item.Sights {
			r := &item.Sights[i]
			name := r.Label()
			if item.Window != nil {
				name = r.Time.Format("15:04:05 UTC ") + name
			}
			t.sightLine(blank, name, r, "")
		}
	}
	if item.End.Sub(item.Begin) > 10*time.Minute && item.Kind != Noon {
		t.line("%sfrom %s to %s ship", blank, t.ship(item.Begin), t.ship(item.End))
	}
	for _, w := range item.Words {
		t.wrapped(blank, w)
	}
}

func (t *text) sightLine(lead, title string, r *RoundSight, error string) {
	figures := ""
	if r != nil {
		figures = fmt.Sprintf("%s  %s  %s", dm.Altitude(r.Preset), dm.Bearing(r.Azimuth), dm.Bearing(r.Relative))
	}
	t.line("%s%-27s  %-21s  %5s", lead, title, figures, error)
}

// Label names the body of a sight, and for Sun and Moon the limb.
func (r *RoundSight) Label() string { return Candidate{Body: r.Body, Limb: r.Limb}.Label() }

// wrapped prints words in lines of the text's width.
func (t *text) wrapped(lead, words string) {
	line := lead
	for i, w := range strings.Fields(words) {
		if i > 0 && utf8.RuneCountInString(line)+1+utf8.RuneCountInString(w) > textWidth {
			t.line("%s", line)
			line = lead + " "
		} else if i > 0 {
			line += " "
		}
		line += w
	}
	t.line("%s", line)
}
