package calendars

import (
	"bytes"
	"crypto/sha256"
	"fmt"
	"io"
	"strings"
	"time"

	ics "github.com/arran4/golang-ical"

	"gloam/plan"
	"gloam/track"
)

// Options are what a calendar depends on beside the plan.
type Options struct {
	Alarms  []time.Duration // before an event begins, each a second at least
	Busy    bool            // events take up time, where others are planned around them
	Include []plan.ItemKind // what becomes an event; star windows where it is empty
	Stamp   time.Time       // DTSTAMP of what is written, and the instant before which all is past
}

func (o *Options) kinds() []plan.ItemKind {
	if len(o.Include) == 0 {
		return []plan.ItemKind{plan.Stars}
	}
	return o.Include
}

func (o *Options) check() error {
	for _, a := range o.Alarms {
		if a < time.Second {
			return fmt.Errorf("alarm %v before the event (a second or more)", a)
		}
	}
	return nil
}

const (
	productID = "-//gloam//voyage sights//EN"
	uidEnd    = "@gloam"
	color     = "midnightblue" // a name of CSS, as RFC 7986 wants it
	refresh   = "P1D"          // how often to look for a new one, where the file lies on a server
)

// Write writes the plan as a calendar. The same plan and options give the same
// bytes. An event keeps its UID when the voyage, known by its name or where it
// has none by its ends, is planned again and the event falls on the same ship's
// date.
func Write(w io.Writer, p *plan.Plan, opt Options) error {
	data, err := serialise(p, opt)
	if err != nil {
		return err
	}
	_, err = w.Write(data)
	return err
}

func serialise(p *plan.Plan, opt Options) ([]byte, error) {
	if err := opt.check(); err != nil {
		return nil, err
	}
	cal := ics.NewCalendarFor("gloam")
	cal.SetProductId(productID)
	cal.SetCalscale("GREGORIAN")
	cal.SetName(plainName(p.Passage)) // NAME, and X-WR-CALNAME for older readers
	cal.SetColor(color)
	cal.SetRefreshInterval(refresh)
	for _, e := range entries(p, opt) {
		e.event(cal, voyageKey(p.Passage), opt)
	}
	var b bytes.Buffer
	err := cal.SerializeTo(&b, ics.WithNewLineWindows)
	return b.Bytes(), err
}

// voyageKey tells voyages apart in a UID: a hash of the name, or of the ends
// where there is none.
func voyageKey(p *track.Passage) string {
	key := p.Name
	if key == "" {
		from, to := p.Legs[0].From, p.Legs[len(p.Legs)-1].To
		key = fmt.Sprintf("%.2f %.2f %.2f %.2f", from.Lat.Deg(), from.Lon.Deg(), to.Lat.Deg(), to.Lon.Deg())
	}
	return shortHash(key)
}

func shortHash(s string) string { return fmt.Sprintf("%x", sha256.Sum256([]byte(s)))[:12] }

// plainName is the calendar's name. Readers differ in how they take escaped
// characters there, so it has none.
func plainName(p *track.Passage) string {
	name := strings.NewReplacer(",", " ", ";", " ", `\`, " ", "\n", " ").Replace(clean(p.Name))
	if name = strings.Join(strings.Fields(name), " "); name == "" {
		return "Voyage sights"
	}
	return name + " - sights"
}
