// Command gen builds the table that package elp embeds, from the ELP/MPP02
// coefficients in the npm package astronomia 4.2.0 (MIT).
//
// It fetches the package with npm into a temporary folder, or reads an
// unpacked one with -src. It prints how many terms are kept and how far the
// cut series strays from the whole one.
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
	"gloam/astro/internal/elp"
)

// reach is the greatest |t| of the years served, 1990-2100.
const reach = 1.0

// limits are the least amplitudes kept: longitude and latitude in arcseconds,
// distance in kilometres.
var limits = [3]float64{0.003, 0.003, 0.3}

func main() {
	log.SetFlags(0)
	src := flag.String("src", "", "unpacked npm package; fetched with npm where empty")
	out := flag.String("out", "elpmpp02.bin", "file to write")
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
	whole, err := read(filepath.Join(data, "elpMppDe.js"))
	if err != nil {
		return err
	}
	kept := whole
	for c, s := range whole.Series {
		kept.Series[c] = cut(s, limits[c])
	}
	seconds, km := worst(&whole, &kept)
	fmt.Printf("Moon %d of %d terms, worst %.5f' and %.3f km\n", terms(kept), terms(whole), seconds, km)
	return os.WriteFile(out, elp.Pack(kept), 0o644)
}

func read(path string) (th elp.Theory, err error) {
	m, err := coefficients.Read(path)
	if err != nil {
		return th, err
	}
	if err := json.Unmarshal(m["W1"], &th.Mean); err != nil {
		return th, fmt.Errorf("%s: W1: %w", path, err)
	}
	for c, name := range []string{"L", "B", "R"} {
		var powers map[string][][2 + elp.Degree]float64
		if err := json.Unmarshal(m[name], &powers); err != nil {
			return th, fmt.Errorf("%s: %s: %w", path, name, err)
		}
		th.Series[c] = make(elp.Series, len(powers))
		for k := range th.Series[c] {
			for _, row := range powers[strconv.Itoa(k)] {
				th.Series[c][k] = append(th.Series[c][k], elp.Term{A: row[0], P: [elp.Degree + 1]float64(row[1:])})
			}
		}
	}
	return th, nil
}

// cut keeps the terms that can reach the limit within the years served.
func cut(s elp.Series, limit float64) elp.Series {
	kept := make(elp.Series, len(s))
	for k, terms := range s {
		for _, t := range terms {
			if math.Abs(t.A)*math.Pow(reach, float64(k)) >= limit {
				kept[k] = append(kept[k], t)
			}
		}
	}
	return kept
}

func terms(th elp.Theory) (n int) {
	for _, s := range th.Series {
		for _, power := range s {
			n += len(power)
		}
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
		across := math.Hypot(math.Hypot(a[1]*b[2]-a[2]*b[1], a[2]*b[0]-a[0]*b[2]), a[0]*b[1]-a[1]*b[0])
		dot := a[0]*b[0] + a[1]*b[1] + a[2]*b[2]
		angle = math.Max(angle, math.Atan2(across, dot)*180/math.Pi*60)
		km = math.Max(km, math.Abs(math.Sqrt(dot/(length(b)/length(a)))-length(b)))
	}
	return angle, km
}

func length(v [3]float64) float64 { return math.Hypot(math.Hypot(v[0], v[1]), v[2]) }
