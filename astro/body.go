package astro

import (
	_ "embed"
	"fmt"
	"strconv"
	"strings"
	"sync"
)

// Body is the Sun, the Moon, a planet, Aries or one of the stars.
type Body int

// The bodies of the solar system, and Aries (the true equinox of date). The
// 57 navigational stars follow in alphabetical order, then Polaris; see [Stars].
const (
	Sun Body = iota
	Moon
	Venus
	Mars
	Jupiter
	Saturn
	Aries
	firstStar
)

var solarNames = [firstStar]string{"Sun", "Moon", "Venus", "Mars", "Jupiter", "Saturn", "Aries"}

// Class tells what kind of body a Body is.
type Class string

// The classes, as written in the plan's JSON. Aries is a reference point.
const (
	ClassSun    Class = "sun"
	ClassMoon   Class = "moon"
	ClassPlanet Class = "planet"
	ClassStar   Class = "star"
	ClassPoint  Class = "point"
)

// Class gives the body's class.
func (b Body) Class() Class {
	switch {
	case b == Sun:
		return ClassSun
	case b == Moon:
		return ClassMoon
	case b == Aries:
		return ClassPoint
	case b < firstStar:
		return ClassPlanet
	}
	return ClassStar
}

// String gives the body's usual English name.
func (b Body) String() string {
	if b < firstStar {
		return solarNames[b]
	}
	return catalogue()[b-firstStar].name
}

// Planets gives Venus, Mars, Jupiter and Saturn.
func Planets() []Body { return []Body{Venus, Mars, Jupiter, Saturn} }

// Stars gives the 57 navigational stars in alphabetical order, then Polaris.
func Stars() []Body { return Bodies()[firstStar:] }

// Bodies gives all bodies: Sun, Moon, planets, Aries, stars.
func Bodies() []Body {
	all := make([]Body, int(firstStar)+len(catalogue()))
	for i := range all {
		all[i] = Body(i)
	}
	return all
}

// ParseBody finds a body by its name; capitals do not matter.
func ParseBody(name string) (Body, error) {
	for _, b := range Bodies() {
		if strings.EqualFold(name, b.String()) {
			return b, nil
		}
	}
	return 0, fmt.Errorf("body %q (Sun, Moon, a planet, Aries or a navigational star)", name)
}

//go:embed stars.csv
var starsCSV string

// star is a catalogue entry: place and motion at J2000.0 in the ICRS.
type star struct {
	name      string
	place     vector  // unit vector
	motion    vector  // change of the unit vector, per Julian year
	parallax  float64 // radians
	magnitude float64
}

var catalogue = sync.OnceValue(func() []star {
	var stars []star
	for line := range strings.Lines(starsCSV) {
		f := strings.Split(strings.TrimSpace(line), ",")
		if strings.HasPrefix(line, "#") || f[0] == "name" {
			continue
		}
		stars = append(stars, newStar(f))
	}
	return stars
})

// newStar reads the fields name, designation, RA (h:m:s), Dec (d:m:s), proper
// motion in RA times cos Dec and in Dec (mas/yr), radial velocity (km/s),
// parallax (mas), magnitude.
func newStar(f []string) star {
	num := func(i int) float64 { return must(strconv.ParseFloat(f[i], 64)) }
	ra, dec := 15*sexagesimal(f[2])*degree, sexagesimal(f[3])*degree
	s := star{name: f[0], place: spherical(ra, dec), parallax: num(7) * mas, magnitude: num(8)}
	east := vector{-sin(ra), cos(ra), 0}
	north := vector{-sin(dec) * cos(ra), -sin(dec) * sin(ra), cos(dec)}
	// Radial velocity foreshortens or stretches the motion; 4.740470446 km/s
	// is one AU per Julian year.
	radial := num(6) / 4.740470446 * s.parallax
	s.motion = east.scale(num(4) * mas).add(north.scale(num(5) * mas)).add(s.place.scale(radial))
	return s
}

// sexagesimal reads h:m:s or d:m:s with an optional sign.
func sexagesimal(text string) float64 {
	sign := 1.0
	if strings.HasPrefix(text, "-") {
		sign = -1
	}
	sum, unit := 0.0, 1.0
	for part := range strings.SplitSeq(strings.TrimLeft(text, "+-"), ":") {
		sum += must(strconv.ParseFloat(part, 64)) / unit
		unit *= 60
	}
	return sign * sum
}

// must is for the embedded catalogue, which a test reads whole.
func must(x float64, err error) float64 {
	if err != nil {
		panic("astro: stars.csv: " + err.Error())
	}
	return x
}
