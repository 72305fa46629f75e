package sheet

import (
	"fmt"
	"html/template"
	"time"

	"gloam/plan"
)

// Measures of the ribbon, in the units of its viewBox.
const (
	ribbonLeft = 88.0
	ribbonHour = 24.0
	ribbonRow  = 17.0
	ribbonTop  = 20.0
)

// lightClass names the shade of each light.
var lightClass = map[plan.Light]string{plan.Night: "night", plan.NauticalTwilight: "nautical", plan.CivilTwilight: "civil", plan.Daylight: "day"}

// ribbon draws days, ship's time across and dates down: light, Moon, windows,
// noon and what is done to the clock.
func ribbon(id string, p *plan.Plan, days []plan.Day) template.HTML {
	s := &svg{}
	width, height := ribbonLeft+25*ribbonHour+8, ribbonTop+ribbonRow*float64(len(days))+6
	s.open("ribbon", id, width, height, "The voyage's days", ribbonWords(days))
	for h := 0; h <= 24; h += 3 {
		x := ribbonLeft + float64(h)*ribbonHour
		s.text("hour", x, ribbonTop-7, "middle", fmt.Sprintf("%02d", h))
		s.line("grid", x, ribbonTop-3, x, height-4)
	}
	for i := range days {
		s.ribbonDay(p, &days[i], ribbonTop+float64(i)*ribbonRow)
	}
	return s.close()
}

func ribbonWords(days []plan.Day) string {
	windows := 0
	for _, d := range days {
		windows += len(d.Windows)
	}
	return fmt.Sprintf("%d ship's dates with night, twilight and day, the Moon above the horizon, noon and %d star windows; the blocks below give the times.", len(days), windows)
}

func (s *svg) ribbonDay(p *plan.Plan, d *plan.Day, y float64) {
	begin := p.Clock.At(d.Begin)
	start := float64(begin.Hour()) + float64(begin.Minute())/60
	x := func(t time.Time) float64 {
		h := start + t.Sub(d.Begin).Hours()
		return ribbonLeft + min(max(h, 0), 25)*ribbonHour
	}
	s.text("date", ribbonLeft-13, y+ribbonRow-5.5, "end", d.Date.Format("Mon 2 Jan"))
	if len(d.Changes) > 0 {
		s.text("shift", ribbonLeft-5, y+ribbonRow-5.5, "middle", changeMark(d))
	}
	for _, l := range d.Light {
		s.rect(lightClass[l.Light], x(l.From), y, x(l.To)-x(l.From), ribbonRow-3)
	}
	for _, m := range d.MoonUp {
		s.rect("moon-up", x(m.From), y+ribbonRow-5.5, x(m.To)-x(m.From), 2.5)
	}
	for _, e := range d.Events {
		if e.Kind == plan.MeridianPassage {
			s.line("noon", x(e.Time), y, x(e.Time), y+ribbonRow-3)
		}
	}
	for i := range d.Windows {
		w := &d.Windows[i]
		s.rect("window", x(w.Begin), y+1, max(x(w.End)-x(w.Begin), 2), ribbonRow-7)
	}
}

// changeMark is a sign for what is done to the clock: forward, back, or the
// date line.
func changeMark(d *plan.Day) string {
	for _, c := range d.Changes {
		switch {
		case c.Dates != 0:
			return "|"
		case c.Clock > 0:
			return "+"
		}
	}
	return "-"
}
