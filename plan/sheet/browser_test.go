package sheet

import (
	"bytes"
	"context"
	"encoding/json"
	"fmt"
	"html"
	"maps"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
	"time"

	"gloam/plan"
	"gloam/track"
)

// chromium runs the browser without a window, or skips the test.
func chromium(t *testing.T, args ...string) (stdout, stderr string) {
	t.Helper()
	if _, err := exec.LookPath("chromium"); err != nil {
		t.Skip("chromium is not installed: .ci/run installs it")
	}
	ctx, cancel := context.WithTimeout(context.Background(), time.Minute)
	defer cancel()
	base := []string{"--headless", "--no-sandbox", "--disable-gpu", "--hide-scrollbars", "--user-data-dir=" + t.TempDir(), "--enable-logging=stderr", "--v=0"}
	cmd := exec.CommandContext(ctx, "chromium", append(base, args...)...)
	var out, errs bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, &errs
	if err := cmd.Run(); err != nil {
		t.Skipf("chromium does not run here: %v: %.300s", err, errs.String())
	}
	return out.String(), errs.String()
}

// checker loads sheets at widths, one after the other, and tells what meets, what
// is clipped, and what they ask the network for. Labels of a picture are held
// against each other by the boxes that the browser gives them.
const checker = `<!DOCTYPE html><meta charset="utf-8"><iframe id="f" style="height:900px;border:0"></iframe><pre id="out"></pre><script>
const jobs = %s, results = [], f = document.getElementById("f");
function check(job) {
  const d = f.contentDocument, problems = [];
  d.getElementById("bow").checked = job.BowUp;
  if (d.documentElement.scrollWidth > f.clientWidth) problems.push("page " + d.documentElement.scrollWidth + " wide");
  for (const svg of d.querySelectorAll("svg.disc, svg.ribbon, svg.chart, svg.fix")) {
    const edge = svg.getBoundingClientRect(), kind = svg.getAttribute("class") + ": ";
    if (edge.width === 0) continue;
    const texts = [...svg.querySelectorAll("text")].map(t => ({t: t.textContent, r: t.getBoundingClientRect()}));
    for (const a of texts)
      if (a.r.left < edge.left - 1 || a.r.right > edge.right + 1 || a.r.top < edge.top - 1 || a.r.bottom > edge.bottom + 1) problems.push(kind + a.t + " is clipped");
    for (let i = 0; i < texts.length; i++) for (let j = i + 1; j < texts.length; j++) {
      const a = texts[i].r, b = texts[j].r;
      if (a.left < b.right - .5 && b.left < a.right - .5 && a.top < b.bottom - .5 && b.top < a.bottom - .5) problems.push(kind + texts[i].t + " meets " + texts[j].t);
    }
  }
  for (const e of d.querySelectorAll("td, th, dd, p, h1, h2, h3, li")) {
    const r = e.getBoundingClientRect();
    if (r.width > 0 && r.right > f.clientWidth + 1 && !e.closest(".wide")) problems.push(e.tagName + " runs out: " + e.textContent.slice(0, 40));
  }
  const asked = f.contentWindow.performance.getEntriesByType("resource").map(e => e.name);
  results.push({Name: job.Name, Problems: problems.slice(0, 20), Asked: asked, Discs: d.querySelectorAll("svg.disc").length});
}
let k = -1;
function next() {
  if (k >= 0) check(jobs[k]);
  if (++k == jobs.length) { document.getElementById("out").textContent = JSON.stringify(results); return; }
  f.style.width = jobs[k].Width + "px";
  f.src = jobs[k].File + "?" + k;
}
f.onload = () => { if (k >= 0 || f.src) next(); };
window.onload = () => { if (k < 0) next(); };
</script>`

// job is a sheet to look at, verdict what came of it.
type (
	job struct {
		Name, File string
		Width      int
		BowUp      bool
	}
	verdict struct {
		Name            string
		Problems, Asked []string
		Discs           int
	}
)

func look(t *testing.T, dir string, jobs []job) (all []verdict) {
	t.Helper()
	list, err := json.Marshal(jobs)
	if err != nil {
		t.Fatal(err)
	}
	wrapper := filepath.Join(dir, "check.html")
	if err := os.WriteFile(wrapper, fmt.Appendf(nil, checker, list), 0o600); err != nil {
		t.Fatal(err)
	}
	out, errs := chromium(t, "--allow-file-access-from-files", "--disable-web-security", "--window-size=1400,1000", "--virtual-time-budget=600000", "--dump-dom", "file://"+wrapper)
	for _, l := range strings.Split(errs, "\n") {
		if strings.Contains(l, "CONSOLE") {
			t.Errorf("on the console: %s", l)
		}
	}
	m := regexp.MustCompile(`(?s)<pre id="out">(.*?)</pre>`).FindStringSubmatch(out)
	if m == nil || json.Unmarshal([]byte(html.UnescapeString(m[1])), &all) != nil || len(all) != len(jobs) {
		t.Fatalf("the checker gave %d verdicts of %d: %.300s", len(all), len(jobs), errs)
	}
	return all
}

// In a browser, at the widths of a phone, a tablet and a desk, over the examples
// and ten random voyages: nothing written to the console, nothing asked of the
// network, no label meets another or is clipped, nothing runs out of the page.
func TestInABrowser(t *testing.T) {
	if testing.Short() {
		t.Skip("a browser takes some seconds")
	}
	dir := t.TempDir()
	voyages := exampleVoyages(t)
	rng := rand.New(rand.NewPCG(41, 42))
	for i := range 10 {
		voyages[fmt.Sprintf("random-%d", i)] = randomVoyage(t, rng)
	}
	var jobs []job
	for _, name := range slices.Sorted(maps.Keys(voyages)) {
		if err := os.WriteFile(filepath.Join(dir, name+".html"), written(t, voyages[name]), 0o600); err != nil {
			t.Fatal(err)
		}
		for i, width := range []int{360, 820, 1280} {
			jobs = append(jobs, job{fmt.Sprintf("%s at %d px", name, width), name + ".html", width, i == 1})
		}
	}
	discs := 0
	for _, v := range look(t, dir, jobs) {
		discs += v.Discs
		if len(v.Problems) > 0 || len(v.Asked) > 0 {
			t.Errorf("%s: %q; asked for %q", v.Name, v.Problems, v.Asked)
		}
	}
	t.Logf("%d pages, %d discs", len(jobs), discs)
	if discs < 300 {
		t.Errorf("%d discs, want 300 or more", discs)
	}
}

// Printed, a voyage of fifteen days takes at most twenty pages, and every star
// window stands in it once; on A4 and on Letter.
func TestPrinted(t *testing.T) {
	if testing.Short() {
		t.Skip("a browser takes some seconds")
	}
	if exec.Command("pdfinfo", "-v").Run() != nil {
		t.Skip("poppler-utils is not installed: .ci/run installs it")
	}
	p := exampleVoyages(t)["trade-wind-crossing"]
	dir := t.TempDir()
	for _, paper := range []string{"A4", "letter"} {
		file, pdf := filepath.Join(dir, paper+".html"), filepath.Join(dir, paper+".pdf")
		data := bytes.Replace(written(t, p), []byte("@page { "), []byte("@page { size: "+paper+"; "), 1)
		if err := os.WriteFile(file, data, 0o600); err != nil {
			t.Fatal(err)
		}
		chromium(t, "--no-pdf-header-footer", "--print-to-pdf="+pdf, "file://"+file)
		info, err := exec.Command("pdfinfo", pdf).Output()
		if err != nil {
			t.Fatal(err)
		}
		var pages int
		for _, l := range strings.Split(string(info), "\n") {
			fmt.Sscanf(l, "Pages: %d", &pages)
		}
		if pages == 0 || pages > 20 {
			t.Errorf("%s: %d pages, want at most 20", paper, pages)
		}
		text, err := exec.Command("pdftotext", "-layout", pdf, "-").Output()
		if err != nil {
			t.Fatal(err)
		}
		got := len(regexp.MustCompile(`(?m)^\f? *(Evening|Morning|Midnight|Midday) Stars *$`).FindAll(text, -1))
		if want := len(p.Windows()); got != want {
			t.Errorf("%s: %d windows in the print, want %d", paper, got, want)
		}
		if first, _, _ := bytes.Cut(text, []byte("\f")); !bytes.Contains(first, []byte(plan.Cautions[0])) {
			t.Errorf("%s: no cautions on the first page", paper)
		}
		t.Logf("%s: %d pages", paper, pages)
	}
}

// randomVoyage is a voyage of a week or so from anywhere to somewhere.
func randomVoyage(t testing.TB, rng *rand.Rand) *plan.Plan {
	t.Helper()
	lat, lon := -65+140*rng.Float64(), 360*rng.Float64()-180
	r := &track.Route{Name: "Random <voyage> & \"quotes\"", Waypoints: []track.Waypoint{{Position: track.PositionFromDeg(lat, lon)}}}
	for range 2 {
		lat = max(min(lat+10*(2*rng.Float64()-1), 80), -70)
		lon += 24 * (2*rng.Float64() - 1)
		r.Waypoints = append(r.Waypoints, track.Waypoint{Name: "Waypoint", Position: track.PositionFromDeg(lat, lon)})
	}
	at := time.Date(2027, 1, 1, 0, 0, 0, 0, time.UTC).Add(time.Duration(rng.IntN(700*24)) * time.Hour)
	p, err := r.Sail(track.Orders{Departure: at, SpeedKn: 8})
	if err != nil {
		t.Fatal(err)
	}
	set := plan.DefaultSettings()
	set.Kinds = plan.ItemKinds
	if rng.IntN(2) == 0 {
		arc, err := plan.ParseArc("180-230")
		if err != nil {
			t.Fatal(err)
		}
		set.Clouds, set.Blind = []plan.Arc{arc}, []plan.Arc{arc}
	}
	made, err := plan.New(p, set)
	if err != nil {
		t.Fatal(err)
	}
	return made
}

// The pages are valid HTML by html-validate (npm), hostile names included.
func TestValidHTML(t *testing.T) {
	tool, err := filepath.Abs("../../.ci/node_modules/.bin/html-validate")
	if err != nil {
		t.Fatal(err)
	}
	if exec.Command(tool, "--version").Run() != nil {
		t.Skip("html-validate is not installed: .ci/run installs it")
	}
	dir := t.TempDir()
	pages := map[string][]byte{"hostile": written(t, long(t, `"><svg onload=x> & <b>`, 2))}
	for name, p := range exampleVoyages(t) {
		pages[name] = written(t, p)
	}
	var files []string
	for name, data := range pages {
		file := filepath.Join(dir, name+".html")
		if err := os.WriteFile(file, data, 0o600); err != nil {
			t.Fatal(err)
		}
		files = append(files, file)
	}
	out, err := exec.Command(tool, append([]string{"-c", "testdata/htmlvalidate.json"}, files...)...).CombinedOutput()
	if err != nil {
		t.Errorf("%v: %.2000s", err, out)
	}
	// The tool does find what is wrong.
	broken := filepath.Join(dir, "broken.html")
	if err := os.WriteFile(broken, bytes.Replace(pages["hostile"], []byte("</h1>"), []byte("</h2>"), 1), 0o600); err != nil {
		t.Fatal(err)
	}
	if exec.Command(tool, "-c", "testdata/htmlvalidate.json", broken).Run() == nil {
		t.Error("a broken page is taken for valid")
	}
}
