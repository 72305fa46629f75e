package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"
)

// exampleStamp is the DTSTAMP of the calendars in the folder examples.
var exampleStamp = time.Date(2026, 12, 1, 0, 0, 0, 0, time.UTC)

// planned runs gloam plan in this process and gives standard output.
func planned(t *testing.T, args ...string) []byte {
	t.Helper()
	var out, errs bytes.Buffer
	w := world{strings.NewReader(""), &out, &errs, func(string) string { return "" }, func() time.Time { return exampleStamp }}
	if code := run(append([]string{"plan"}, args...), w); code != exitDone {
		t.Fatalf("%v: exit %d: %s", args, code, &errs)
	}
	return out.Bytes()
}

// The text and the calendar beside each example route are what it gives.
func TestExamplesAreTrue(t *testing.T) {
	routes, err := filepath.Glob("../../examples/*.geojson")
	if err != nil || len(routes) < 3 {
		t.Fatalf("%d example routes, want 3 or more (%v)", len(routes), err)
	}
	for _, route := range routes {
		stem := strings.TrimSuffix(route, ".geojson")
		golden(t, stem+".txt", planned(t, route))
		golden(t, stem+".ics", planned(t, route, "--ics", "-"))
	}
}

func golden(t *testing.T, file string, got []byte) {
	t.Helper()
	if *update {
		if err := os.WriteFile(file, got, 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.Equal(got, want) {
		t.Errorf("%s is not what the route gives; see the difference after go test ./cmd/gloam -update", file)
	}
}
