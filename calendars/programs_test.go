package calendars

import (
	"bytes"
	"fmt"
	"io"
	"net"
	"net/http"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"gloam/plan"
)

// A calendar and its update after half a day's delay, in which a window is lost
// and others move.
func firstAndUpdated(t *testing.T) (first, second []byte, before, after *plan.Plan) {
	before, after = plain(t, sails), plain(t, "2027-02-11T00:00:00Z")
	first = written(t, before, usual)
	second, _ = updated(t, first, after, later())
	return first, second, before, after
}

// khal (Debian), a calendar in the terminal, shows each window once: after the
// first import, after importing the same file again, and after the update, when
// it marks the lost one as cancelled.
func TestImportIntoKhal(t *testing.T) {
	if exec.Command("khal", "--version").Run() != nil {
		t.Skip("khal is not installed: .ci/run installs it")
	}
	dir := t.TempDir()
	config := fmt.Sprintf("[calendars]\n[[voyage]]\npath = %s/cal\n[locale]\ntimeformat = %%H:%%M\ndateformat = %%Y-%%m-%%d\nlongdateformat = %%Y-%%m-%%d\ndatetimeformat = %%Y-%%m-%%d %%H:%%M\n"+
		"longdatetimeformat = %%Y-%%m-%%d %%H:%%M\nlocal_timezone = UTC\ndefault_timezone = UTC\n[sqlite]\npath = %s/khal.db\n", dir, dir)
	write(t, filepath.Join(dir, "config"), []byte(config))
	khal := func(args ...string) string {
		cmd := exec.Command("khal", append([]string{"-c", filepath.Join(dir, "config")}, args...)...)
		cmd.Env = append(os.Environ(), "HOME="+dir, "LC_ALL=C.UTF-8")
		out, err := cmd.CombinedOutput()
		if err != nil {
			t.Fatalf("khal %v: %v: %s", args, err, out)
		}
		return string(out)
	}
	shown := func(data []byte) (all, cancelled int) {
		write(t, filepath.Join(dir, "import.ics"), data)
		khal("import", "--batch", "-a", "voyage", filepath.Join(dir, "import.ics"))
		list := khal("list", "--format", "EVENT {title} {cancelled}", "--day-format", "", "2027-02-10", "2027-02-20")
		return strings.Count(list, "EVENT "), strings.Count(list, "CANCELLED")
	}
	first, second, before, after := firstAndUpdated(t)
	windows := len(before.Windows())
	for _, c := range []struct {
		name           string
		data           []byte
		all, cancelled int
	}{
		{"first", first, windows, 0},
		{"first again", first, windows, 0},
		{"update", second, bytes.Count(second, []byte("BEGIN:VEVENT")), bytes.Count(second, []byte("STATUS:CANCELLED"))},
	} {
		if all, cancelled := shown(c.data); all != c.all || cancelled != c.cancelled {
			t.Errorf("%s: %d events, %d of them cancelled; want %d and %d", c.name, all, cancelled, c.all, c.cancelled)
		}
	}
	if got, want := bytes.Count(second, []byte("BEGIN:VEVENT"))-bytes.Count(second, []byte("STATUS:CANCELLED")), len(after.Windows()); got != want {
		t.Errorf("%d events stand, want %d", got, want)
	}
}

func write(t *testing.T, path string, data []byte) {
	t.Helper()
	if err := os.WriteFile(path, data, 0o600); err != nil {
		t.Fatal(err)
	}
}

// Radicale (Debian), a calendar server, takes the file and the update by PUT
// and gives back as many events, each UID once, the lost one cancelled.
func TestServeByRadicale(t *testing.T) {
	if exec.Command("radicale", "--version").Run() != nil {
		t.Skip("radicale is not installed: .ci/run installs it")
	}
	base := serve(t)
	first, second, _, _ := firstAndUpdated(t)
	for _, data := range [][]byte{first, first, second} {
		request(t, http.MethodPut, base+"voyage/", data)
		got := request(t, http.MethodGet, base+"voyage/", nil)
		cal, err := readLines(bytes.NewReader(got))
		if err != nil {
			t.Fatal(err)
		}
		uids, cancelled := map[string]int{}, 0
		for _, e := range cal.parts("VEVENT") {
			uids[e.value("UID")]++
			if e.value("STATUS") == "CANCELLED" {
				cancelled++
			}
		}
		if want := bytes.Count(data, []byte("BEGIN:VEVENT")); len(uids) != want || len(cal.parts("VEVENT")) != want {
			t.Errorf("%d events of %d UIDs, want %d", len(cal.parts("VEVENT")), len(uids), want)
		}
		if want := bytes.Count(data, []byte("STATUS:CANCELLED")); cancelled != want {
			t.Errorf("%d cancelled, want %d", cancelled, want)
		}
	}
	// What the server gives back can be brought up to date.
	got := request(t, http.MethodGet, base+"voyage/", nil)
	if _, changes := updated(t, got, plain(t, "2027-02-11T00:00:00Z"), later()); len(changes) > 0 {
		t.Errorf("what the server has changes again: %q", changes)
	}
}

// serve starts the server on a free port of this machine and gives its address
// with a user's folder.
func serve(t *testing.T) string {
	t.Helper()
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Skipf("no port can be opened here: %v", err)
	}
	address := l.Addr().String()
	l.Close()
	cmd := exec.Command("radicale", "--config", "", "--server-hosts", address, "--auth-type", "none", "--storage-filesystem-folder", t.TempDir(), "--rights-type", "owner_only")
	var log bytes.Buffer
	cmd.Stdout, cmd.Stderr = &log, &log
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		_ = cmd.Process.Kill()
		_ = cmd.Wait()
	})
	for range 100 {
		if c, err := net.Dial("tcp", address); err == nil {
			c.Close()
			return "http://" + address + "/mate/"
		}
		time.Sleep(50 * time.Millisecond)
	}
	t.Fatalf("the server does not answer: %s", &log)
	return ""
}

func request(t *testing.T, method, url string, data []byte) []byte {
	t.Helper()
	r, err := http.NewRequest(method, url, bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	r.SetBasicAuth("mate", "mate")
	r.Header.Set("Content-Type", "text/calendar; charset=utf-8")
	answer, err := http.DefaultClient.Do(r)
	if err != nil {
		t.Fatal(err)
	}
	defer answer.Body.Close()
	body, err := io.ReadAll(answer.Body)
	if err != nil || answer.StatusCode >= 300 {
		t.Fatalf("%s %s: %s, %v: %s", method, url, answer.Status, err, body)
	}
	return body
}

// libical (Debian's libical-dev) parses what is written and updated without an
// error, its check of RFC 5545's restrictions included.
func TestLibical(t *testing.T) {
	parser := filepath.Join(t.TempDir(), "parse")
	if out, err := exec.Command("cc", "testdata/parse.c", "-o", parser, "-lical").CombinedOutput(); err != nil {
		t.Skipf("no C compiler or no libical-dev here, .ci/run installs it: %v %.100s", err, out)
	}
	first, second, _, _ := firstAndUpdated(t)
	all := usual
	all.Include, all.Busy, all.Alarms = plan.ItemKinds, true, []time.Duration{time.Hour, 10 * time.Minute}
	for i, data := range [][]byte{first, second, written(t, plain(t, sails), all), written(t, voyage(t, hostile[0], hostile[1], sails), usual)} {
		cmd := exec.Command(parser)
		cmd.Stdin = bytes.NewReader(data)
		out, err := cmd.CombinedOutput()
		if got, want := strings.TrimSpace(string(out)), fmt.Sprint(bytes.Count(data, []byte("BEGIN:VEVENT"))); err != nil || got != want {
			t.Errorf("calendar %d: %v, %.300s; want %s events", i, err, got, want)
		}
	}
}
