package main

import (
	"os"
	"regexp"
	"strings"
	"testing"
)

// Every line of the README's excerpts stands in the example's output named
// after the fence; "..." stands for lines left out.
func TestReadmeExcerptsAreTrue(t *testing.T) {
	readme, err := os.ReadFile("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	fences := regexp.MustCompile("(?ms)^```text (\\S+)\n(.*?)^```$").FindAllStringSubmatch(string(readme), -1)
	if len(fences) < 2 {
		t.Fatalf("%d excerpts, want 2 or more", len(fences))
	}
	for _, f := range fences {
		whole, err := os.ReadFile("../../examples/" + f[1])
		if err != nil {
			t.Fatal(err)
		}
		rest := string(whole)
		for _, line := range strings.Split(strings.TrimSpace(f[2]), "\n") {
			if line == "..." {
				continue
			}
			_, after, found := strings.Cut(rest, line+"\n")
			if !found {
				t.Errorf("%s has no line %q, or not in this order", f[1], line)
				break
			}
			rest = after
		}
	}
}
