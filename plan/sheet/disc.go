package sheet

import (
	"fmt"
	"html/template"
	"math"
	"slices"
	"strings"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/plan"
	"gloam/track/dm"
)

// Size of a disc: its sky, and with the bearings round it.
const (
	skyRadius  = 150.0
	discCentre = 178.0
	discSize   = 2 * discCentre
)

// disc draws the sky of a window.
type disc struct {
	svg
	window   *plan.Window
	set      *plan.Settings
	up       unit.Angle // bearing at the top
	overhead bool
	labels   labels
	unnamed  []string // bodies without room for a name
}

// Disc draws the bodies of a window at its best instant: zenith in the middle,
// the altitude limits as rings, true bearings round the edge, the round joined
// in its order. bowUp turns the ship's head up; overhead puts east to the left,
// as one sees it looking up. id must be the page's own.
func Disc(id string, w *plan.Window, set *plan.Settings, bowUp, overhead bool) template.HTML {
	d := &disc{window: w, set: set, overhead: overhead, labels: labels{cx: discCentre, cy: discCentre, r: skyRadius}}
	if bowUp {
		d.up = w.Fix.Course
	}
	d.open("disc", id, discSize, discSize+14, "Sky of the "+w.Kind.Words(), d.words())
	d.horizon()
	d.glow()
	d.arcs()
	d.bearings()
	d.join()
	d.bodies()
	hand := "as on a chart, east right of north"
	if overhead {
		hand = "as seen overhead, east left of north"
	}
	d.text("note", discCentre, discSize+9, "middle", hand)
	return d.close()
}

// words say what the picture shows.
func (d *disc) words() string {
	var all []string
	for _, c := range d.window.Bodies {
		all = append(all, fmt.Sprintf("%s %s high, bearing %s", c.Label(), dm.Altitude(c.Altitude), dm.Bearing(c.Azimuth)))
	}
	if len(all) == 0 {
		return "No body can be shot."
	}
	return strings.Join(all, "; ") + fmt.Sprintf(". Ship's head %s.", dm.Bearing(d.window.Fix.Course))
}

// at is the place of a direction, altitude 90° in the middle.
func (d *disc) at(altitude, bearing unit.Angle) (x, y float64) {
	turn := bearing - d.up
	if d.overhead {
		turn = -turn
	}
	return polar(discCentre, discCentre, skyRadius*(90-altitude.Deg())/90, turn)
}

func (d *disc) horizon() {
	d.circle("sky", discCentre, discCentre, skyRadius)
	for _, limit := range []unit.Angle{d.set.LowestAltitude, d.set.HighestAltitude} {
		d.circle("limit", discCentre, discCentre, skyRadius*(90-limit.Deg())/90)
	}
	d.line("cross", discCentre-4, discCentre, discCentre+4, discCentre)
	d.line("cross", discCentre, discCentre-4, discCentre, discCentre+4)
}

// wedge is a part of the horizon from an altitude down, between two bearings.
func (d *disc) wedge(class string, from, to, altitude unit.Angle) {
	var path strings.Builder
	const steps = 24
	width := (to - from).Mod1()
	point := func(h, bearing unit.Angle) {
		x, y := d.at(h, bearing)
		letter := byte('L')
		if path.Len() == 0 {
			letter = 'M'
		}
		fmt.Fprintf(&path, "%c%s %s", letter, num(x), num(y))
	}
	for i := range steps + 1 {
		point(0, from+width.Mul(float64(i)/steps))
	}
	for i := range steps + 1 {
		point(altitude, to-width.Mul(float64(i)/steps))
	}
	d.add(`<path class="%s" d="%sZ"/>`, class, path.String())
}

// glow is where the Sun is below the horizon.
func (d *disc) glow() {
	half := unit.AngleFromDeg(35)
	d.wedge("glow", d.window.SunAzimuth-half, d.window.SunAzimuth+half, unit.AngleFromDeg(14))
}

func (d *disc) arcs() {
	for _, a := range d.set.Clouds {
		d.wedge("cloud", a.From, a.To, unit.AngleFromDeg(88))
	}
	for _, a := range d.set.Blind {
		d.wedge("blind", a.From+d.window.Fix.Course, a.To+d.window.Fix.Course, unit.AngleFromDeg(25))
	}
}

// bearings are written every thirty degrees round the edge, and the ship's head
// is marked.
func (d *disc) bearings() {
	for b := 0; b < 360; b += 10 {
		bearing := unit.AngleFromDeg(float64(b))
		x, y := d.at(0, bearing)
		out := unit.AngleFromDeg(-2)
		if b%30 == 0 {
			out = unit.AngleFromDeg(-4)
			tx, ty := d.at(unit.AngleFromDeg(-11), bearing)
			d.text("bearing", tx, ty+3.5, "middle", fmt.Sprintf("%03d", b))
		}
		ox, oy := d.at(out, bearing)
		d.line("tick", x, y, ox, oy)
	}
	head := d.window.Fix.Course
	tipX, tipY := d.at(unit.AngleFromDeg(1), head)
	leftX, leftY := d.at(unit.AngleFromDeg(8), head-unit.AngleFromDeg(3))
	rightX, rightY := d.at(unit.AngleFromDeg(8), head+unit.AngleFromDeg(3))
	d.add(`<path class="head" d="M%s %sL%s %sL%s %sZ"/>`, num(tipX), num(tipY), num(leftX), num(leftY), num(rightX), num(rightY))
	d.labels.mark((tipX+leftX)/2, (tipY+leftY)/2, 8)
}

// join draws the round's way from sight to sight.
func (d *disc) join() {
	var path strings.Builder
	for _, r := range d.window.Round {
		for _, c := range d.window.Bodies {
			if c.Body != r.Body {
				continue
			}
			x, y := d.at(c.Altitude, c.Azimuth)
			letter := 'L'
			if path.Len() == 0 {
				letter = 'M'
			}
			fmt.Fprintf(&path, "%c%s %s", letter, num(x), num(y))
		}
	}
	if path.Len() > 0 {
		d.add(`<path class="round" d="%s"/>`, path.String())
	}
}

// bodies draws the marks, then the names: those of the round first, with their
// number in it.
func (d *disc) bodies() {
	order := slices.Clone(d.window.Bodies)
	slices.SortStableFunc(order, func(a, b plan.Candidate) int { return d.rank(a.Body) - d.rank(b.Body) })
	for _, c := range order {
		x, y := d.at(c.Altitude, c.Azimuth)
		r := markRadius(c.Body, c.Magnitude)
		class := "star"
		if c.Body.Class() != astro.ClassStar {
			class = "wanderer"
		}
		d.circle(class, x, y, r)
		d.labels.mark(x, y, r+1)
	}
	for _, c := range order {
		d.name(&c)
	}
}

// rank is a body's place in the round, or one after it.
func (d *disc) rank(b astro.Body) int {
	for i, r := range d.window.Round {
		if r.Body == b {
			return i
		}
	}
	return len(d.window.Round)
}

func (d *disc) name(c *plan.Candidate) {
	x, y := d.at(c.Altitude, c.Azimuth)
	name, class, letter := c.Body.String(), "name", letterWidth
	if n := d.rank(c.Body); n < len(d.window.Round) {
		name, class, letter = fmt.Sprintf("%d %s", n+1, name), "name chosen", boldWidth
	}
	b, ok := d.labels.place(x, y, markRadius(c.Body, c.Magnitude), letter*float64(len(name)))
	if !ok {
		d.unnamed = append(d.unnamed, name)
		return
	}
	d.text(class, b.x+b.width/2, b.y+b.height-3.2, "middle", name)
	if far := math.Hypot(b.x+b.width/2-x, b.y+b.height/2-y); far > b.width/2+14 {
		d.line("leader", x, y, math.Max(b.x, math.Min(x, b.x+b.width)), math.Max(b.y, math.Min(y, b.y+b.height)))
	}
}

// markRadius grows with brightness.
func markRadius(b astro.Body, magnitude float64) float64 {
	if b == astro.Moon {
		return 6
	}
	return math.Min(math.Max(3.4-0.75*magnitude, 1.3), 5)
}

// DiscFile is a disc as a file of its own, black on white, the ship's head up or
// not as the course says.
func DiscFile(w *plan.Window, set *plan.Settings, overhead bool) string {
	picture := string(Disc("disc", w, set, false, overhead))
	picture = strings.Replace(picture, "<svg ", `<svg xmlns="http://www.w3.org/2000/svg" width="712" height="740" `, 1)
	colours := `svg{background:#fff;--ground:#fff;--ink:#111;--soft:#555;--rule:#999;--fill:#eee;--civil:#ccc;--accent:#000}`
	return strings.Replace(picture, "<title", "<style>"+colours+style[strings.Index(style, "svg text"):strings.Index(style, ".bowup")]+discRules()+"</style><title", 1) + "\n"
}

// discRules are the rules of the page's style that a disc needs.
func discRules() string {
	from, to := strings.Index(style, ".sky {"), strings.Index(style, ".night {")
	return style[from:to]
}
