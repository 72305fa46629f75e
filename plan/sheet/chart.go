package sheet

import (
	_ "embed"
	"fmt"
	"html/template"
	"math"
	"strconv"
	"strings"
	"sync"
	"time"

	"gloam/plan"
	"gloam/track"
)

//go:embed coast.txt
var coastText string

// point is a place in degrees; longitudes may run on past ±180°.
type point struct{ lon, lat float64 }

// coast reads the rings of the land.
var coast = sync.OnceValue(func() (rings [][]point) {
	for l := range strings.Lines(coastText) {
		var ring []point
		var x, y int
		for i, f := range strings.Fields(l) {
			n, err := strconv.Atoi(f)
			if err != nil {
				panic("sheet: the coastline built in is damaged")
			}
			if i%2 == 0 {
				x += n
			} else {
				y += n
				ring = append(ring, point{float64(x) / 10, float64(y) / 10})
			}
		}
		rings = append(rings, ring)
	}
	return rings
})

const (
	chartWidth = 700.0
	chartMost  = 420.0 // height
)

// view is the part of the world that a chart shows: equal degrees of longitude,
// those of latitude longer by the middle latitude's secant.
type view struct {
	west, east, south, north float64
	scale, stretch           float64 // pixels a degree of longitude; latitude's to it
}

func (v *view) x(lon float64) float64 { return (lon - v.west) * v.scale }
func (v *view) y(lat float64) float64 { return (v.north - lat) * v.scale * v.stretch }

// newView holds a track with room around it.
func newView(line []point) *view {
	v := &view{west: math.Inf(1), east: math.Inf(-1), south: math.Inf(1), north: math.Inf(-1)}
	for _, p := range line {
		v.west, v.east = math.Min(v.west, p.lon), math.Max(v.east, p.lon)
		v.south, v.north = math.Min(v.south, p.lat), math.Max(v.north, p.lat)
	}
	v.stretch = 1 / math.Max(math.Cos((v.south+v.north)/2*math.Pi/180), 0.05)
	room := math.Max(0.12*math.Max(v.east-v.west, (v.north-v.south)*v.stretch), 1.5)
	v.west, v.east = v.west-room, v.east+room
	v.south, v.north = math.Max(v.south-room/v.stretch, -90), math.Min(v.north+room/v.stretch, 90)
	if tall := (v.north - v.south) * v.stretch / (v.east - v.west); tall > chartMost/chartWidth { // too tall: widen
		more := (v.north-v.south)*v.stretch*chartWidth/chartMost - (v.east - v.west)
		v.west, v.east = v.west-more/2, v.east+more/2
	} else if least := 0.28; tall < least { // too flat: raise
		more := (least*(v.east-v.west)/v.stretch - (v.north - v.south)) / 2
		v.south, v.north = math.Max(v.south-more, -90), math.Min(v.north+more, 90)
	}
	v.scale = chartWidth / (v.east - v.west)
	return v
}

// chart draws the track with coastlines and the windows on it.
func chart(id string, p *plan.Plan) template.HTML {
	line := trackLine(p.Passage)
	v := newView(line)
	height := v.y(v.south)
	s := &svg{}
	first, last := p.Passage.Legs[0].From, p.Passage.Legs[len(p.Passage.Legs)-1].To
	s.open("chart", id, chartWidth, height, "The track", fmt.Sprintf("From %s to %s, %.0f NM, with %d star windows marked.", first.Label(), last.Label(), p.Passage.DistanceNM, len(p.Windows())))
	s.add(`<clipPath id="%s-c"><rect width="%s" height="%s"/></clipPath><g clip-path="url(#%s-c)">`, id, num(chartWidth), num(height), id)
	s.rect("sea", 0, 0, chartWidth, height)
	s.land(v)
	s.grid(v, height)
	s.add(`<path class="track" d="%s"/>`, path(v, line, false))
	s.marks(v, p, line[0].lon, height)
	s.add("</g>")
	s.rect("frame", 0, 0, chartWidth, height)
	return s.close()
}

// trackLine is the passage in small steps, longitudes running on.
func trackLine(p *track.Passage) (line []point) {
	length := p.Arrival.Sub(p.Departure)
	const steps = 240
	for i := range steps + 1 {
		line = append(line, runOn(line, p.At(p.Departure.Add(length/steps*time.Duration(i))).Position))
	}
	return line
}

// runOn is a position with its longitude next to the last point's.
func runOn(line []point, at track.Position) point {
	q := point{at.Lon.Deg(), at.Lat.Deg()}
	if n := len(line); n > 0 {
		q.lon = line[n-1].lon + math.Remainder(q.lon-line[n-1].lon, 360)
	}
	return q
}

func path(v *view, line []point, closed bool) string {
	var b strings.Builder
	for i, p := range line {
		letter := 'L'
		if i == 0 {
			letter = 'M'
		}
		fmt.Fprintf(&b, "%c%s %s", letter, num(v.x(p.lon)), num(v.y(p.lat)))
	}
	if closed {
		b.WriteByte('Z')
	}
	return b.String()
}

// land draws the rings that come into view, a turn east or west where that
// brings them there.
func (s *svg) land(v *view) {
	var all strings.Builder
	for _, ring := range coast() {
		for turn := -720.0; turn <= 720; turn += 360 {
			shifted, seen := make([]point, len(ring)), false
			west, east, south, north := math.Inf(1), math.Inf(-1), math.Inf(1), math.Inf(-1)
			for i, p := range ring {
				shifted[i] = point{p.lon + turn, p.lat}
				west, east = math.Min(west, p.lon+turn), math.Max(east, p.lon+turn)
				south, north = math.Min(south, p.lat), math.Max(north, p.lat)
			}
			seen = west < v.east && east > v.west && south < v.north && north > v.south
			if seen {
				all.WriteString(path(v, shifted, true))
			}
		}
	}
	s.add(`<path class="land" d="%s"/>`, all.String())
}

// grid draws meridians and parallels at round degrees, with their names.
func (s *svg) grid(v *view, height float64) {
	step := 30.0
	for _, d := range []float64{1, 2, 5, 10, 20, 30} {
		if (v.east-v.west)/d <= 8 {
			step = d
			break
		}
	}
	for lon := math.Ceil(v.west/step) * step; lon < v.east; lon += step {
		s.line("grid", v.x(lon), 0, v.x(lon), height)
		if x := v.x(lon); x > 24 && x < chartWidth-24 {
			s.text("degree", x, height-4, "middle", lonName(lon))
		}
	}
	for lat := math.Ceil(v.south/step) * step; lat < v.north; lat += step {
		s.line("grid", 0, v.y(lat), chartWidth, v.y(lat))
		if y := v.y(lat); y > 14 && y < height-18 {
			s.text("degree", 4, y-3, "start", hemisphere(lat, "N", "S"))
		}
	}
}

func lonName(lon float64) string { return hemisphere(math.Remainder(lon, 360), "E", "W") }

func hemisphere(deg float64, positive, negative string) string {
	if deg < 0 {
		return fmt.Sprintf("%g° %s", -deg, negative)
	}
	return fmt.Sprintf("%g° %s", deg, positive)
}

// marks are the windows, with the date of the first on each day where there is
// room for it.
func (s *svg) marks(v *view, p *plan.Plan, from, height float64) {
	var taken []box
	line := []point{{from, 0}}
	for _, d := range p.Days {
		for i := range d.Windows {
			line = append(line, runOn(line, d.Windows[i].Fix.Position))
			x, y := v.x(line[len(line)-1].lon), v.y(line[len(line)-1].lat)
			s.circle("mark", x, y, 2.6)
			if i > 0 {
				continue
			}
			b := box{x - 17, y - 19, 34, 11}
			room := b.x > 2 && b.x+b.width < chartWidth-2 && b.y > 2 && b.y+b.height < height-18
			for _, t := range taken {
				room = room && !b.meets(t)
			}
			if room {
				taken = append(taken, b)
				s.text("when", x, b.y+9, "middle", d.Date.Format("2 Jan"))
			}
		}
	}
}
