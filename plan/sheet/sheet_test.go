package sheet

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
	"time"

	"golang.org/x/net/html"

	"gloam/plan"
	"gloam/track"
)

func written(t testing.TB, p *plan.Plan) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := Write(&b, p, Options{}); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// exampleVoyages are the plans of the example routes.
func exampleVoyages(t testing.TB) map[string]*plan.Plan {
	t.Helper()
	files, err := filepath.Glob("../../examples/*.geojson")
	if err != nil || len(files) < 3 {
		t.Fatalf("%d examples, %v", len(files), err)
	}
	all := map[string]*plan.Plan{}
	for _, name := range files {
		f, err := os.Open(name)
		if err != nil {
			t.Fatal(err)
		}
		r, err := track.Read(f)
		f.Close()
		if err != nil {
			t.Fatal(err)
		}
		all[strings.TrimSuffix(filepath.Base(name), ".geojson")] = planned(t, r, track.Orders{})
	}
	return all
}

func planned(t testing.TB, r *track.Route, o track.Orders) *plan.Plan {
	t.Helper()
	p, err := r.Sail(o)
	if err != nil {
		t.Fatal(err)
	}
	made, err := plan.New(p, plan.DefaultSettings())
	if err != nil {
		t.Fatal(err)
	}
	return made
}

// long is a voyage of so many days up and down a meridian.
func long(t testing.TB, name string, days float64) *plan.Plan {
	t.Helper()
	r := &track.Route{Name: name}
	for i := 0; float64(i) < days/10+1; i++ {
		r.Waypoints = append(r.Waypoints, track.Waypoint{Name: name, Position: track.PositionFromDeg(20+30*float64(i%2), -40)})
	}
	miles := 1796.0 * float64(len(r.Waypoints)-1) // 30° of latitude there, to a mile
	return planned(t, r, track.Orders{Departure: time.Date(2026, 11, 20, 12, 0, 0, 0, time.UTC), SpeedKn: miles / days / 24})
}

// The page asks for nothing: no script, no address but fragments of itself, and
// a policy that would forbid it; every id once, every reference to one that is
// there, headings in order, tables with headers, pictures with texts.
func TestPageIsSelfContained(t *testing.T) {
	for name, p := range exampleVoyages(t) {
		doc, err := html.Parse(bytes.NewReader(written(t, p)))
		if err != nil {
			t.Fatal(err)
		}
		ids, heading := map[string]bool{}, 0
		var references []string
		var walk func(n *html.Node)
		walk = func(n *html.Node) {
			if n.Type == html.ElementNode {
				for _, a := range n.Attr {
					switch {
					case a.Key == "id" && ids[a.Val]:
						t.Errorf("%s: id %s twice", name, a.Val)
					case a.Key == "id":
						ids[a.Val] = true
					case a.Key == "href" && strings.HasPrefix(a.Val, "#"):
						references = append(references, a.Val[1:])
					case a.Key == "aria-labelledby":
						references = append(references, strings.Fields(a.Val)...)
					case a.Key == "src" || a.Key == "href" || strings.HasPrefix(a.Key, "on") || a.Key == "action":
						t.Errorf("%s: <%s %s=%q>", name, n.Data, a.Key, a.Val)
					}
				}
				switch n.Data {
				case "script", "link", "img", "iframe", "object":
					t.Errorf("%s: a <%s>", name, n.Data)
				case "h1", "h2", "h3":
					level := int(n.Data[1] - '0')
					if level > heading+1 {
						t.Errorf("%s: <%s> after level %d", name, n.Data, heading)
					}
					heading = level
				case "table":
					var b bytes.Buffer
					_ = html.Render(&b, n)
					if !strings.Contains(b.String(), "<thead>") || !strings.Contains(b.String(), `scope="col"`) || !strings.Contains(b.String(), "<caption>") {
						t.Errorf("%s: a table without headers or caption", name)
					}
				case "svg":
					var b bytes.Buffer
					_ = html.Render(&b, n)
					if !strings.Contains(b.String(), `role="img"`) || !strings.Contains(b.String(), "<desc") {
						t.Errorf("%s: a picture without a text", name)
					}
				}
			}
			for c := n.FirstChild; c != nil; c = c.NextSibling {
				walk(c)
			}
		}
		walk(doc)
		for _, r := range references {
			if !ids[r] {
				t.Errorf("%s: nothing has the id %s", name, r)
			}
		}
	}
	if !strings.Contains(pageText, "default-src 'none'") {
		t.Error("no policy against requests")
	}
}

func TestSameBytes(t *testing.T) {
	p := long(t, "Twice", 5)
	if !bytes.Equal(written(t, p), written(t, p)) {
		t.Error("two writings differ")
	}
}

// Names made to break out are shown as they are.
func TestHostileNames(t *testing.T) {
	for _, name := range []string{`<script>alert(1)</script>`, `"><svg onload=x>`, "</style></title><b>", "\u202eright to left שם", strings.Repeat("long name ", 300), "]]>&amp;'"} {
		data := string(written(t, long(t, name, 2)))
		for _, bad := range []string{"<script", "<svg onload", "</title><b>", "<b>\n"} {
			if strings.Contains(data, bad) {
				t.Errorf("%q comes out as markup", name)
			}
		}
		if strings.Count(data, "<style>") != 1 {
			t.Errorf("%q broke the style", name)
		}
	}
}

// Sizes: 30 days under 1.5 MB, 400 days under 20 MB; a voyage without windows
// has a page too.
func TestSizes(t *testing.T) {
	if n := len(written(t, long(t, "Month", 30))); n > 1500000 {
		t.Errorf("30 days take %d bytes, want at most 1.5 MB", n)
	} else {
		t.Logf("30 days: %d bytes", n)
	}
	if n := len(written(t, long(t, "Year", 399))); n > 20000000 {
		t.Errorf("399 days take %d bytes, want at most 20 MB", n)
	} else {
		t.Logf("399 days: %d bytes", n)
	}
	r := &track.Route{Waypoints: []track.Waypoint{{Position: track.PositionFromDeg(78, 10)}, {Position: track.PositionFromDeg(79, 8)}}}
	polar := planned(t, r, track.Orders{Departure: time.Date(2027, 6, 20, 6, 0, 0, 0, time.UTC), SpeedKn: 5})
	if data := written(t, polar); !bytes.Contains(data, []byte("No star window: the Sun does not sink to -6°")) || bytes.Contains(data, []byte(`class="disc"`)) {
		t.Error("a voyage without windows")
	}
}

// Contrast by WCAG 2.1 (relative luminance, 1.4.3): text at least 4.5 to 1 in
// every palette; at night no more than 5 to 1, and red alone.
func TestContrast(t *testing.T) {
	palettes := regexp.MustCompile(`--ground: (#\w{6}); --ink: (#\w{6}); --soft: (#\w{6})`).FindAllStringSubmatch(style, -1)
	if len(palettes) != 4 { // paper, day, night, and night again for a system that asks for dark
		t.Fatalf("%d palettes, want 4", len(palettes))
	}
	for _, p := range palettes {
		for _, ink := range p[2:] {
			c := contrast(t, ink, p[1])
			if c < 4.5 {
				t.Errorf("%s on %s: %.2f to 1", ink, p[1], c)
			}
			if p[1] == "#000000" && (c > 5 || !strings.HasSuffix(ink, "0000")) {
				t.Errorf("night: %s is %.2f to 1", ink, c)
			}
		}
	}
	i := strings.Index(style, "body:has(#p-night:checked) {")
	night := style[i : i+strings.Index(style[i:], "}")]
	for _, c := range regexp.MustCompile(`#\w{6}`).FindAllString(night, -1) {
		if !strings.HasSuffix(c, "0000") || contrast(t, c, "#000000") > 5 {
			t.Errorf("night has %s", c)
		}
	}
}

func contrast(t *testing.T, a, b string) float64 {
	t.Helper()
	light := func(c string) float64 {
		sum := 0.0
		for i, weight := range []float64{0.2126, 0.7152, 0.0722} {
			n, err := strconv.ParseUint(c[1+2*i:3+2*i], 16, 8)
			if err != nil {
				t.Fatal(err)
			}
			x := float64(n) / 255
			if x <= 0.04045 {
				x /= 12.92
			} else {
				x = math.Pow((x+0.055)/1.055, 2.4)
			}
			sum += weight * x
		}
		return sum
	}
	la, lb := light(a), light(b)
	return (math.Max(la, lb) + 0.05) / (math.Min(la, lb) + 0.05)
}

// Every body of a window stands in its disc, named beside its mark or counted
// as unnamed; names keep apart by the boxes they were given.
func TestDiscNames(t *testing.T) {
	unnamed, all := 0, 0
	for _, p := range exampleVoyages(t) {
		for _, w := range p.Windows() {
			for _, bowUp := range []bool{false, true} {
				d := &disc{window: &w, set: &p.Settings, labels: labels{cx: discCentre, cy: discCentre, r: skyRadius}}
				if bowUp {
					d.up = w.Fix.Course
				}
				d.bearings()
				marks := len(d.labels.taken)
				d.bodies()
				all += len(w.Bodies)
				unnamed += len(d.unnamed)
				if got := len(d.labels.taken) - marks + len(d.unnamed); got != 2*len(w.Bodies) {
					t.Errorf("%s: %d boxes for %d bodies", w.ID, got, len(w.Bodies))
				}
				for i, a := range d.labels.taken[marks+len(w.Bodies):] {
					for _, b := range d.labels.taken[:marks+len(w.Bodies)+i] {
						if a.meets(b) {
							t.Errorf("%s: %v meets %v", w.ID, a, b)
						}
					}
				}
			}
		}
	}
	t.Logf("%d bodies, %d without room for a name", all, unnamed)
	if unnamed*100 > all {
		t.Errorf("%d of %d bodies without a name", unnamed, all)
	}
}

// The coastline: 126 rings, no step of half a turn, the southern one closed
// along the pole (Natural Earth 1:110m as world-atlas packs it).
func TestCoast(t *testing.T) {
	rings := coast()
	if len(rings) != 126 {
		t.Errorf("%d rings, want 126", len(rings))
	}
	pole := false
	for _, ring := range rings {
		for i, p := range ring {
			pole = pole || p.lat == -90
			if math.Abs(p.lat) > 90 || i > 0 && p.lat > -90 && ring[i-1].lat > -90 && math.Abs(p.lon-ring[i-1].lon) > 60 {
				t.Errorf("a jump at %v", p)
			}
		}
	}
	if !pole {
		t.Error("no ring round the pole")
	}
}

// A track over the antimeridian stays in one piece, in a view that is no wider
// than the voyage asks for.
func TestChartOverTheAntimeridian(t *testing.T) {
	p := exampleVoyages(t)["pacific-great-circle"]
	line := trackLine(p.Passage)
	for i := 1; i < len(line); i++ {
		if math.Abs(line[i].lon-line[i-1].lon) > 5 {
			t.Fatalf("the track jumps from %v to %v", line[i-1], line[i])
		}
	}
	if v := newView(line); v.east-v.west > 160 || v.west > line[0].lon || v.east < line[len(line)-1].lon {
		t.Errorf("a view from %v to %v for a track from %v to %v", v.west, v.east, line[0].lon, line[len(line)-1].lon)
	}
}

func TestNumbers(t *testing.T) {
	for x, want := range map[float64]string{0: "0", -0.01: "0", 1: "1", 12.34: "12.3", -3.96: "-4", 0.05: "0.1"} {
		if got := num(x); got != want {
			t.Errorf("%v: %s, want %s", x, got, want)
		}
	}
}

type failing struct{}

func (failing) Write([]byte) (int, error) { return 0, fmt.Errorf("no space left") }

func TestWriteTellsOfErrors(t *testing.T) {
	if Write(failing{}, long(t, "Short", 1), Options{}) == nil {
		t.Error("a failing writer went unnoticed")
	}
}

func BenchmarkSheet30Days(b *testing.B) {
	p := long(b, "Month", 30)
	b.ReportAllocs()
	for b.Loop() {
		if err := Write(io.Discard, p, Options{}); err != nil {
			b.Fatal(err)
		}
	}
}
