package astro

import (
	"maps"
	"slices"
	"strconv"
	"strings"
	"testing"
)

func TestBodies(t *testing.T) {
	if n := len(Stars()); n != 58 {
		t.Fatalf("%d stars, want 57 and Polaris", n)
	}
	classes := map[Class]int{}
	seen := map[string]bool{}
	for _, b := range Bodies() {
		for _, name := range []string{b.String(), strings.ToUpper(b.String()), strings.ToLower(b.String())} {
			if got, err := ParseBody(name); err != nil || got != b {
				t.Errorf("%q parses as %v (%v)", name, got, err)
			}
		}
		if seen[b.String()] || b.String() == "" {
			t.Errorf("%d shares its name %q, or has none", int(b), b)
		}
		seen[b.String()] = true
		classes[b.Class()]++
	}
	if want := (map[Class]int{ClassSun: 1, ClassMoon: 1, ClassPlanet: 4, ClassPoint: 1, ClassStar: 58}); !maps.Equal(classes, want) {
		t.Errorf("classes %v, want %v", classes, want)
	}
	for b, want := range map[Body]Class{Sun: ClassSun, Moon: ClassMoon, Aries: ClassPoint} {
		if b.Class() != want {
			t.Errorf("%v is a %v, want %v", b, b.Class(), want)
		}
	}
	for _, b := range Planets() {
		if b.Class() != ClassPlanet {
			t.Errorf("%v is a %v", b, b.Class())
		}
	}
}

func TestStarsInOrder(t *testing.T) {
	var names []string
	for _, b := range Stars() {
		if b.Class() != ClassStar {
			t.Errorf("%v is a %v", b, b.Class())
		}
		names = append(names, b.String())
	}
	if !slices.IsSorted(names[:57]) || names[57] != "Polaris" {
		t.Errorf("%v: want alphabetical order and Polaris", names)
	}
}

// An unknown name is met with itself and with what is allowed.
func TestParseBodyErrors(t *testing.T) {
	for _, name := range []string{"Pluto", "", "Siriu", "58"} {
		_, err := ParseBody(name)
		if err == nil || !strings.Contains(err.Error(), strconv.Quote(name)) || !strings.Contains(err.Error(), "navigational star") {
			t.Errorf("%q: %v", name, err)
		}
	}
}
