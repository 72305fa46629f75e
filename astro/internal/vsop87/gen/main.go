// Command gen builds the table that package vsop87 embeds, from the VSOP87B
// coefficient files in the npm package astronomia 4.2.0 (MIT; its files are
// made from the theory's own, Bretagnon & Francou, CDS VI/81).
//
// It fetches the package with npm into a temporary folder, or reads an
// unpacked one with -src. It prints, for each planet, how many terms are kept
// and how far the cut series strays from the whole one, seen from the Earth.
package main

import (
	"encoding/json"
	"flag"
	"fmt"
	"log"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strconv"

	"gloam/astro/internal/coefficients"
	"gloam/astro/internal/vsop87"
)

// reach is the greatest |τ| of the years served, 1990-2100.
const reach = 0.1

// limits are the least amplitudes kept, in radians of heliocentric longitude
// and latitude, and in the distance as a part of it. The nearer a planet
// comes, the more its errors weigh.
var limits = [...]float64{3e-9, 2e-9, 2.5e-9, 6e-9, 8e-9}

func main() {
	log.SetFlags(0)
	src := flag.String("src", "", "unpacked npm package; fetched with npm where empty")
	out := flag.String("out", "vsop87b.bin", "file to write")
	flag.Parse()
	if err := run(*src, *out); err != nil {
		log.Fatal("gen: ", err)
	}
}

func run(src, out string) error {
	data, done, err := coefficients.Folder(src)
	if err != nil {
		return err
	}
	defer done()
	var whole, kept [len(vsop87.Names)]vsop87.Theory
	for p, name := range vsop87.Names {
		th, err := read(filepath.Join(data, "vsop87B"+name+".js"))
		if err != nil {
			return err
		}
		whole[p], kept[p] = th, cut(th, limits[p])
	}
	for p, name := range vsop87.Names {
		fmt.Printf("%-8s %5d of %5d terms, worst %.5f' from the Earth\n", name, terms(kept[p]), terms(whole[p]), worst(whole, kept, p))
	}
	return os.WriteFile(out, vsop87.Pack(kept), 0o644)
}

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
		th[c] = make(vsop87.Series, len(powers))
		for k := range th[c] {
			for _, t := range powers[strconv.Itoa(k)] {
				th[c][k] = append(th[c][k], vsop87.Term{A: t[0], B: t[1], C: t[2]})
			}
		}
	}
	return th, nil
}

// cut keeps the terms that can reach the limit within the years served.
func cut(th vsop87.Theory, limit float64) (kept vsop87.Theory) {
	mean := th[2][0][0].A
	for c, s := range th {
		scale := 1.0
		if c == 2 {
			scale = mean
		}
		kept[c] = make(vsop87.Series, len(s))
		for k, terms := range s {
			for _, t := range terms {
				if math.Abs(t.A)*math.Pow(reach, float64(k)) >= limit*scale {
					kept[c][k] = append(kept[c][k], t)
				}
			}
		}
	}
	return kept
}

func terms(th vsop87.Theory) (n int) {
	for _, s := range th {
		for _, power := range s {
			n += len(power)
		}
	}
	return n
}

// worst is the greatest angle, in minutes of arc, between the directions from
// the Earth by the whole and by the cut series; for the Earth, to the Sun.
func worst(whole, kept [len(vsop87.Names)]vsop87.Theory, p int) (w float64) {
	rng := rand.New(rand.NewPCG(1, 2))
	for range 3000 {
		tau := -0.01 + 0.11*rng.Float64()
		a, b := seen(whole, p, tau), seen(kept, p, tau)
		cross := math.Hypot(math.Hypot(a[1]*b[2]-a[2]*b[1], a[2]*b[0]-a[0]*b[2]), a[0]*b[1]-a[1]*b[0])
		dot := a[0]*b[0] + a[1]*b[1] + a[2]*b[2]
		w = math.Max(w, math.Atan2(cross, dot)*180/math.Pi*60)
	}
	return w
}

func seen(all [len(vsop87.Names)]vsop87.Theory, p int, tau float64) (v vsop87.Vector) {
	earth, _ := all[vsop87.Earth].PlaceVelocity(tau)
	if p != int(vsop87.Earth) {
		v, _ = all[p].PlaceVelocity(tau)
	}
	for i := range v {
		v[i] -= earth[i]
	}
	return v
}
