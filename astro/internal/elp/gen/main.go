// Command gen builds the table that package elp embeds, from the ELP/MPP02
// coefficients in the npm package astronomia 4.2.0 (MIT; made from the theory's
// own, Chapront & Francou).
//
// It prints how many terms are kept and how far the cut series strays from the
// whole one.
package main

import (
	"encoding/json"
	"fmt"
	"math"
	"math/rand/v2"
	"path/filepath"
	"strconv"

	"gloam/astro/internal/coefficients"
	"gloam/astro/internal/elp"
	"gloam/astro/internal/series"
)

// reach is the greatest |t| of the years served, 1990-2100.
const reach = 1.0

// limits are the least amplitudes kept: longitude and latitude in arcseconds,
// distance in kilometres. Terms above the limits in bent keep the bend of
// their phase, which by 2100 comes to 0.0004 radians at most.
var (
	limits = [3]float64{0.003, 0.003, 0.3}
	bent   = [3]float64{0.5, 0.5, 100}
)

func main() { coefficients.Main(pack) }

func pack(data string) ([]byte, error) {
	path := filepath.Join(data, "elpMppDe.js")
	m, err := coefficients.Read(path)
	if err != nil {
		return nil, err
	}
	var whole, kept elp.Theory
	if err := json.Unmarshal(m["W1"], &whole.Mean); err != nil {
		return nil, fmt.Errorf("%s: W1: %w", path, err)
	}
	kept.Mean = whole.Mean
	for c, name := range []string{"L", "B", "R"} {
		if whole.Coordinates[c], err = read(m[name], 0); err != nil {
			return nil, fmt.Errorf("%s: %s: %w", path, name, err)
		}
		kept.Coordinates[c], _ = read(m[name], bent[c])
		kept.Coordinates[c].Straight = kept.Coordinates[c].Straight.Cut(limits[c], reach)
	}
	angle, km := worst(&whole, &kept)
	fmt.Printf("Moon %d of %d terms, worst %.5f' and %.2f km\n", terms(&kept), terms(&whole), angle, km)
	return kept.Pack(), nil
}

// read reads one coordinate. Rows are A and the phase of a sine; those of the
// first power that reach the limit keep a bent phase.
func read(raw json.RawMessage, limit float64) (c elp.Coordinate, err error) {
	var powers map[string][][6]float64
	if err := json.Unmarshal(raw, &powers); err != nil {
		return c, err
	}
	c.Straight = make(series.Series, len(powers))
	for k := range c.Straight {
		for _, row := range powers[strconv.Itoa(k)] {
			row[1] -= math.Pi / 2 // sine to cosine
			if k == 0 && math.Abs(row[0]) >= limit {
				c.Bent = append(c.Bent, elp.Bent{A: row[0], Phase: elp.Polynomial(row[1:])})
			} else {
				c.Straight[k] = append(c.Straight[k], series.Term{A: row[0], B: row[1], C: row[2]})
			}
		}
	}
	return c, nil
}

func terms(th *elp.Theory) (n int) {
	for _, c := range th.Coordinates {
		n += len(c.Bent) + c.Straight.Len()
	}
	return n
}

// worst is the greatest angle in minutes of arc, and difference of distance in
// kilometres, between the whole and the cut series.
func worst(whole, kept *elp.Theory) (angle, km float64) {
	rng := rand.New(rand.NewPCG(1, 2))
	for range 3000 {
		t := -0.1 + 1.1*rng.Float64()
		a, b := whole.Place(t), kept.Place(t)
		angle = math.Max(angle, coefficients.Apart(a, b))
		km = math.Max(km, math.Abs(length(a)-length(b)))
	}
	return angle, km
}

func length(v [3]float64) float64 { return math.Hypot(math.Hypot(v[0], v[1]), v[2]) }
