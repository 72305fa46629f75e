package plan

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"github.com/soniakeys/unit"
)

// Arc is a part of the horizon, clockwise from one bearing to another.
type Arc struct{ From, To unit.Angle }

// Contains tells whether a bearing lies in the arc, its ends included.
func (a Arc) Contains(bearing unit.Angle) bool {
	return (bearing - a.From).Mod1() <= (a.To - a.From).Mod1()
}

// ParseArc reads "180-260": two bearings in degrees, 0 to 360, clockwise from
// the first to the second. An arc of no width or of the whole horizon is
// refused.
func ParseArc(text string) (Arc, error) {
	from, to, ok := strings.Cut(text, "-")
	a, errA := strconv.ParseFloat(strings.TrimSpace(from), 64)
	b, errB := strconv.ParseFloat(strings.TrimSpace(to), 64)
	if !ok || errA != nil || errB != nil || !(a >= 0 && a <= 360 && b >= 0 && b <= 360) {
		return Arc{}, fmt.Errorf("%q (two bearings, as 180-260)", text)
	}
	if math.Mod(b-a, 360) == 0 {
		return Arc{}, fmt.Errorf("%q (less than the whole horizon, more than nothing)", text)
	}
	return Arc{unit.AngleFromDeg(a), unit.AngleFromDeg(b)}, nil
}

// covered tells whether arcs leave no bearing free, to a degree.
func covered(arcs []Arc) bool {
	for d := range 360 {
		if !within(arcs, unit.AngleFromDeg(float64(d))) {
			return false
		}
	}
	return len(arcs) > 0
}

func within(arcs []Arc, bearing unit.Angle) bool {
	for _, a := range arcs {
		if a.Contains(bearing) {
			return true
		}
	}
	return false
}
