package track

import (
	"encoding/xml"
	"fmt"
	"regexp"
	"slices"
	"strconv"
	"time"
)

// rtzSchedule is one schedule of the file.
type rtzSchedule struct {
	manual   bool
	elements []rtzElement
}

// rtzElement is what a schedule says of a waypoint.
type rtzElement struct {
	id string
	Timing
}

// schedule reads a schedule, whose manual and calculated parts count as two.
func (f *rtzFile) schedule(x *xmlReader, e xml.StartElement) error {
	if e.Name.Local != "schedule" {
		return x.skip()
	}
	return x.each(func(e xml.StartElement) error {
		if e.Name.Local != "manual" && e.Name.Local != "calculated" {
			return x.skip()
		}
		s := rtzSchedule{manual: e.Name.Local == "manual"}
		err := x.each(func(e xml.StartElement) error {
			if e.Name.Local != "scheduleElement" && e.Name.Local != "sheduleElement" { // so spelt in 1.0
				return x.skip()
			}
			if len(s.elements) > maxWaypoints {
				return tooMany(maxWaypoints)
			}
			element, err := x.element(e)
			if err != nil {
				return err
			}
			s.elements = append(s.elements, element)
			return x.skip()
		})
		if len(s.elements) > 0 {
			f.schedules = append(f.schedules, s)
		}
		return err
	})
}

func (x *xmlReader) element(e xml.StartElement) (s rtzElement, err error) {
	var ok bool
	if s.id, ok = attribute(e, "waypointId"); !ok {
		return s, x.refuse(e.Name.Local+" attribute waypointId", "missing", "the id of a waypoint")
	}
	if s.ETA, err = x.optionalInstant(e, "eta"); err != nil {
		return s, err
	}
	if s.ETD, err = x.optionalInstant(e, "etd"); err != nil {
		return s, err
	}
	if text, ok := attribute(e, "stay"); ok {
		if s.Stay, err = parseStay(text); err != nil {
			return s, x.refuse(e.Name.Local+" attribute stay", fmt.Sprintf("%q", shorten(text)), "a duration as PT12H30M, or 12:30:00, at most 400 days")
		}
	}
	if text, ok := attribute(e, "speed"); ok {
		s.SpeedKn, err = strconv.ParseFloat(text, 64)
		if err != nil || !(s.SpeedKn >= 0 && s.SpeedKn <= MaxSpeedKn) {
			return s, x.refuse(e.Name.Local+" attribute speed", fmt.Sprintf("%q", shorten(text)), fmt.Sprintf("knots, at most %v", MaxSpeedKn))
		}
	}
	return s, nil
}

var (
	stayDuration = regexp.MustCompile(`^P(?:(\d{1,4})D)?(?:T(?:(\d{1,6})H)?(?:(\d{1,6})M)?(?:(\d{1,9})(?:\.\d+)?S)?)?$`)
	stayTime     = regexp.MustCompile(`^()(\d\d):(\d\d):(\d\d)(?:\.\d+)?Z?$`)
)

// parseStay reads xsd:duration without years and months, or xsd:time.
func parseStay(text string) (stay time.Duration, err error) {
	m := stayDuration.FindStringSubmatch(text)
	if m == nil || text == "P" {
		if m = stayTime.FindStringSubmatch(text); m == nil {
			return 0, fmt.Errorf("stay %q", text)
		}
	}
	for i, unit := range []time.Duration{day, time.Hour, time.Minute, time.Second} {
		n, _ := strconv.Atoi("0" + m[i+1])
		stay += time.Duration(n) * unit
	}
	if stay > MaxDuration {
		return 0, fmt.Errorf("stay %q", text)
	}
	return stay, nil
}

// apply puts the first manual schedule, or else the first calculated one, to
// the waypoints.
func (f *rtzFile) apply(x *xmlReader) error {
	if len(f.schedules) == 0 {
		return nil
	}
	chosen := max(slices.IndexFunc(f.schedules, func(s rtzSchedule) bool { return s.manual }), 0)
	if n := len(f.schedules); n > 1 {
		kind := "calculated"
		if f.schedules[chosen].manual {
			kind = "manual"
		}
		x.notes = append(x.notes, fmt.Sprintf("of %d schedules the first %s one is used", n, kind))
	}
	for _, e := range f.schedules[chosen].elements {
		i, known := f.index[e.id]
		if !known {
			return &Error{"schedule", "waypoint " + shorten(e.id), "the id of a waypoint of the route", "mend the schedule in the file, or take it out"}
		}
		sailing := f.points[i].Sailing
		f.points[i].Timing = e.Timing
		f.points[i].Sailing = sailing
	}
	return nil
}
