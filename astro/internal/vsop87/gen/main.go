// Command gen builds the table that package vsop87 embeds, from the VSOP87B
// coefficient files in the npm package astronomia 4.2.0 (MIT; its files are
// made from the theory's own, Bretagnon & Francou, CDS VI/81).
//
// It prints, for each planet, how many terms are kept and how far the cut series
// strays from the whole one, seen from the Earth.
package main

import (
	"encoding/json"
	"fmt"
	"math"
	"math/rand/v2"
	"path/filepath"
	"strconv"

	"gloam/astro/internal/coefficients"
	"gloam/astro/internal/series"
	"gloam/astro/internal/vsop87"
)

// reach is the greatest |τ| of the years served, 1990-2100.
const reach = 0.1

// limits are the least amplitudes kept, in radians of heliocentric longitude
// and latitude, and in the distance as a part of it. The nearer a planet
// comes, the more its errors weigh.
var limits = [...]float64{6e-9, 2e-9, 2.5e-9, 6e-9, 8e-9}

func main() { coefficients.Main(pack) }

func pack(data string) ([]byte, error) {
	var whole, kept vsop87.Theories
	for p, name := range vsop87.Names {
		th, err := read(filepath.Join(data, "vsop87B"+name+".js"))
		if err != nil {
			return nil, err
		}
		whole[p] = th
		for c, limit := range []float64{limits[p], limits[p], limits[p] * th[2][0][0].A} {
			kept[p][c] = th[c].Cut(limit, reach)
		}
	}
	for p, name := range vsop87.Names {
		fmt.Printf("%-8s %5d of %5d terms, worst %.5f' from the Earth\n", name, terms(kept[p]), terms(whole[p]), worst(&whole, &kept, p))
	}
	return kept.Pack(), nil
}

// read reads longitude, latitude and distance of a planet.
func read(path string) (th vsop87.Theory, err error) {
	m, err := coefficients.Read(path)
	if err != nil {
		return th, err
	}
	for c, name := range []string{"L", "B", "R"} {
		var powers map[string][][3]float64
		if err := json.Unmarshal(m[name], &powers); err != nil {
			return th, fmt.Errorf("%s: %s: %w", path, name, err)
		}
		th[c] = make(series.Series, len(powers))
		for k := range th[c] {
			for _, t := range powers[strconv.Itoa(k)] {
				th[c][k] = append(th[c][k], series.Term{A: t[0], B: t[1], C: t[2]})
			}
		}
	}
	return th, nil
}

func terms(th vsop87.Theory) int { return th[0].Len() + th[1].Len() + th[2].Len() }

// worst is the greatest angle, in minutes of arc, between the directions from
// the Earth by the whole and by the cut series; for the Earth, to the Sun.
func worst(whole, kept *vsop87.Theories, p int) (w float64) {
	rng := rand.New(rand.NewPCG(1, 2))
	for range 3000 {
		tau := -0.01 + 0.11*rng.Float64()
		w = math.Max(w, coefficients.Apart(seen(whole, p, tau), seen(kept, p, tau)))
	}
	return w
}

func seen(all *vsop87.Theories, p int, tau float64) (v vsop87.Vector) {
	earth, _ := all[vsop87.Earth].PlaceVelocity(tau)
	if p != int(vsop87.Earth) {
		v, _ = all[p].PlaceVelocity(tau)
	}
	for i := range v {
		v[i] -= earth[i]
	}
	return v
}
