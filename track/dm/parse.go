package dm

import (
	"fmt"
	"regexp"
	"strconv"
	"strings"

	"github.com/soniakeys/unit"
)

// wanted is the form that errors name.
const wanted = `latitude and longitude, as "49 12.4N 012 30.0W" or "49.2067,-12.5"`

var (
	decimal = regexp.MustCompile(`^\s*([+-]?\d+(?:\.\d+)?)\s*[, ]\s*([+-]?\d+(?:\.\d+)?)\s*$`)
	packed  = regexp.MustCompile(`^\s*(\d{2})(\d{2}(?:\.\d+)?)\s*([NSns])[, ]*(\d{3})(\d{2}(?:\.\d+)?)\s*([EWew])\s*$`)
	spaced  = regexp.MustCompile(`^\s*(\d{1,2})\s*[° -]\s*(\d{1,2}(?:\.\d+)?)?\s*['′]?\s*([NSns])[, ]*(\d{1,3})\s*[° -]\s*(\d{1,2}(?:\.\d+)?)?\s*['′]?\s*([EWew])\s*$`)
	whole   = regexp.MustCompile(`^\s*(\d{1,2}(?:\.\d+)?)()°?\s*([NSns])[, ]*(\d{1,3}(?:\.\d+)?)()°?\s*([EWew])\s*$`)
)

// ParsePosition reads a position in the forms people write: 49 12.4N 12 30W,
// 49°12.4'N, 012°30.0'W, 49.2067,-12.5 and 4912.4N01230.0W. Latitude is north
// positive, [-90°, 90°], longitude east positive, [-180°, 180°].
func ParsePosition(text string) (lat, lon unit.Angle, err error) {
	if m := decimal.FindStringSubmatch(text); m != nil {
		return check(text, number(m[1]), number(m[2]))
	}
	for _, form := range []*regexp.Regexp{packed, spaced, whole} {
		if m := form.FindStringSubmatch(text); m != nil {
			if number(m[2]) >= 60 || number(m[5]) >= 60 {
				return 0, 0, fmt.Errorf("position %q: minutes of 60 or more (0 to under 60)", text)
			}
			return check(text, signed(m[1], m[2], m[3]), signed(m[4], m[5], m[6]))
		}
	}
	return 0, 0, fmt.Errorf("position %q (%s)", text, wanted)
}

// number reads digits that a form has matched; nothing counts as zero.
func number(digits string) float64 {
	x, _ := strconv.ParseFloat(digits, 64)
	return x
}

func signed(deg, min, hemisphere string) float64 {
	d := number(deg) + number(min)/60
	if strings.ContainsAny(hemisphere, "SsWw") {
		return -d
	}
	return d
}

func check(text string, lat, lon float64) (unit.Angle, unit.Angle, error) {
	if lat < -90 || lat > 90 || lon < -180 || lon > 180 {
		return 0, 0, fmt.Errorf("position %q (latitude up to 90, longitude up to 180)", text)
	}
	return unit.AngleFromDeg(lat), unit.AngleFromDeg(lon), nil
}
