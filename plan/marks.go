package plan

import (
	"fmt"

	"gloam/track"
)

// Marks are the windows as points for a map, each where the ship is when the
// window is best.
func (p *Plan) Marks() []track.Mark {
	var marks []track.Mark
	for _, w := range p.Windows() {
		text := fmt.Sprintf("%s to %s UTC", w.Begin.Format("2006-01-02 15:04"), w.End.Format("15:04"))
		if len(w.Triads) > 0 {
			text += ": " + w.Triads[0].Names()
		}
		if c := w.Comment(); c != "" {
			text += "; " + c
		}
		marks = append(marks, track.Mark{Kind: string(w.Kind), Title: w.Kind.Words(), Text: text, Time: w.Best, Position: w.Fix.Position})
	}
	return marks
}
