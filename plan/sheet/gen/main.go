// Command gen builds the coastline that package sheet embeds from Natural
// Earth's 1:110m land (public domain) as the npm package world-atlas 2.0.2
// packs it (land-110m.json, TopoJSON; ISC).
//
// Each ring becomes a line of whole numbers, tenths of a degree: longitude and
// latitude of its first point, then steps. Longitudes run on across ±180°, so
// that no ring jumps; the one round the South Pole is led along the pole.
package main

import (
	"encoding/json"
	"flag"
	"fmt"
	"log"
	"math"
	"os"
	"strings"
)

func main() {
	src := flag.String("src", "node_modules/world-atlas/land-110m.json", "the land of the npm package")
	flag.Parse()
	if err := build(*src, "coast.txt"); err != nil {
		log.Fatal(err)
	}
}

// topology is the part of TopoJSON that is needed.
type topology struct {
	Transform struct{ Scale, Translate [2]float64 }
	Arcs      [][][2]float64
	Objects   map[string]struct {
		Geometries []struct{ Arcs [][][]int }
	}
}

func build(src, dst string) error {
	data, err := os.ReadFile(src)
	if err != nil {
		return err
	}
	var t topology
	if err := json.Unmarshal(data, &t); err != nil {
		return err
	}
	var b strings.Builder
	for _, g := range t.Objects["land"].Geometries {
		for _, polygon := range g.Arcs {
			for _, ring := range polygon {
				write(&b, unwrapped(t.ring(ring)))
			}
		}
	}
	return os.WriteFile(dst, []byte(b.String()), 0o666)
}

// ring joins arcs; one with a negative index runs backwards.
func (t *topology) ring(arcs []int) (points [][2]float64) {
	for _, a := range arcs {
		arc := t.points(max(a, ^a))
		if a < 0 {
			for i, j := 0, len(arc)-1; i < j; i, j = i+1, j-1 {
				arc[i], arc[j] = arc[j], arc[i]
			}
		}
		if len(points) > 0 {
			arc = arc[1:]
		}
		points = append(points, arc...)
	}
	return points
}

// points are those of an arc, in degrees.
func (t *topology) points(arc int) (points [][2]float64) {
	var x, y float64
	for _, step := range t.Arcs[arc] {
		x, y = x+step[0], y+step[1]
		points = append(points, [2]float64{x*t.Transform.Scale[0] + t.Transform.Translate[0], y*t.Transform.Scale[1] + t.Transform.Translate[1]})
	}
	return points
}

// unwrapped lets longitudes run on; a ring that ends a turn away from where it
// began goes round a pole and is closed along it.
func unwrapped(ring [][2]float64) [][2]float64 {
	for i := 1; i < len(ring); i++ {
		ring[i][0] = ring[i-1][0] + math.Remainder(ring[i][0]-ring[i-1][0], 360)
	}
	first, last := ring[0], ring[len(ring)-1]
	if math.Abs(last[0]-first[0]) > 180 {
		pole := math.Copysign(90, first[1])
		ring = append(ring, [2]float64{last[0], pole}, [2]float64{first[0], pole})
	}
	return ring
}

func write(b *strings.Builder, ring [][2]float64) {
	var x, y int
	for i, p := range ring {
		px, py := int(math.Round(p[0]*10)), int(math.Round(p[1]*10))
		if i > 0 && px == x && py == y {
			continue
		}
		if i > 0 {
			b.WriteByte(' ')
		}
		fmt.Fprintf(b, "%d %d", px-x, py-y)
		x, y = px, py
	}
	b.WriteByte('\n')
}
