package almanac

import (
	"encoding/json"
	"fmt"
	"io"
	"time"

	"gloam/astro"
	"gloam/plan"
)

// planFile is the part of a plan's JSON that hourly values depend on.
type planFile struct {
	Format  string `json:"format"`
	Windows []struct {
		ID     string    `json:"id"`
		Begin  time.Time `json:"begin"`
		End    time.Time `json:"end"`
		Bodies []struct {
			Body string `json:"body"`
		} `json:"bodies"`
		Triads []struct {
			Bodies []string `json:"bodies"`
		} `json:"triads"`
		Round []struct {
			Body string `json:"body"`
		} `json:"round"`
	} `json:"windows"`
}

// maxPlanBytes is the size over which a plan is refused: ten times that of 400
// days.
const maxPlanBytes = 64 << 20

// ReadNeeds reads a plan's JSON and gives what its windows need: the bodies of
// the triads and the round, or all bodies where it has neither.
func ReadNeeds(r io.Reader) ([]Need, error) {
	data, err := io.ReadAll(io.LimitReader(r, maxPlanBytes+1))
	if err != nil {
		return nil, err
	}
	if len(data) > maxPlanBytes {
		return nil, fmt.Errorf("over %d MB (a plan is at most that)", maxPlanBytes>>20)
	}
	var f planFile
	if err := json.Unmarshal(data, &f); err != nil {
		return nil, fmt.Errorf("not a plan: %w (JSON as gloam plan --json writes it)", err)
	}
	if f.Format != plan.Format {
		return nil, fmt.Errorf("format %q (%s)", f.Format, plan.Format)
	}
	var needs []Need
	var total time.Duration
	for _, w := range f.Windows {
		var names []string
		for _, t := range w.Triads {
			names = append(names, t.Bodies...)
		}
		for _, s := range w.Round {
			names = append(names, s.Body)
		}
		if len(names) == 0 {
			for _, b := range w.Bodies {
				names = append(names, b.Body)
			}
		}
		total += w.End.Sub(w.Begin)
		if !Serves(w.Begin) || !Serves(w.End) || w.End.Before(w.Begin) || total > MaxHours*time.Hour {
			return nil, fmt.Errorf("window %s: %v to %v (in order, %d to %d, 400 days in all)", w.ID, w.Begin, w.End, Earliest.Year(), Latest.Year()-1)
		}
		bodies, err := distinct(names)
		if err != nil {
			return nil, fmt.Errorf("window %s: %w", w.ID, err)
		}
		needs = append(needs, Need{w.Begin, w.End, bodies})
	}
	return needs, nil
}

// distinct turns names into bodies, each once, in the order of astro's list.
func distinct(names []string) ([]astro.Body, error) {
	wanted := map[astro.Body]bool{}
	for _, n := range names {
		b, err := astro.ParseBody(n)
		if err != nil {
			return nil, err
		}
		wanted[b] = true
	}
	var all []astro.Body
	for _, b := range astro.Bodies() {
		if wanted[b] {
			all = append(all, b)
		}
	}
	return all, nil
}
