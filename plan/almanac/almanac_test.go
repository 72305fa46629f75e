package almanac

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"errors"
	"io"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

var noon = time.Date(2027, 3, 1, 12, 0, 0, 0, time.UTC)

// Every value stands where it applies and nowhere else; CSV and JSON agree.
func TestCSVAndJSON(t *testing.T) {
	rows := Hours(astro.Bodies(), noon, 2, astro.DeltaT)
	var table, list bytes.Buffer
	if WriteCSV(&table, rows) != nil || WriteJSON(&list, rows) != nil {
		t.Fatal("writing to memory failed")
	}
	records, err := csv.NewReader(&table).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var objects []map[string]any
	if err := json.Unmarshal(list.Bytes(), &objects); err != nil {
		t.Fatal(err)
	}
	if len(objects) != len(rows) || len(records) != len(rows)+1 {
		t.Fatalf("%d objects, %d records, want %d and one more", len(objects), len(records), len(rows))
	}
	// Members beside time, body and GHA, by class (the trade's rules for v and d).
	want := map[astro.Class]string{
		astro.ClassPoint:  "",
		astro.ClassSun:    "dec_deg hp_arcmin sd_arcmin d_arcmin magnitude",
		astro.ClassMoon:   "dec_deg hp_arcmin sd_arcmin v_arcmin d_arcmin magnitude illuminated_fraction",
		astro.ClassPlanet: "dec_deg hp_arcmin sd_arcmin v_arcmin d_arcmin magnitude illuminated_fraction",
		astro.ClassStar:   "dec_deg sha_deg magnitude",
	}
	for i, o := range objects {
		var there []string
		for j, name := range records[0] {
			text := records[i+1][j]
			switch x := o[name].(type) {
			case nil:
				if text != "" {
					t.Errorf("row %d: %s is %q in CSV, missing in JSON", i, name, text)
				}
			case string:
				if text != x {
					t.Errorf("row %d: %s is %q in CSV, %q in JSON", i, name, text, x)
				}
			case float64:
				if y, err := strconv.ParseFloat(text, 64); err != nil || y != x {
					t.Errorf("row %d: %s is %q in CSV, %v in JSON", i, name, text, x)
				}
				if name != "gha_deg" {
					there = append(there, name)
				}
			}
		}
		if got := strings.Join(there, " "); got != want[rows[i].Body.Class()] {
			t.Errorf("%v has %q, want %q", rows[i].Body, got, want[rows[i].Body.Class()])
		}
	}
}

// A plan's needs: the hours that hold each window, Aries only for stars, each
// star once, no other body.
func TestForNeeds(t *testing.T) {
	bodies, err := distinct([]string{"Vega", "Moon", "Vega", "Altair"})
	if err != nil {
		t.Fatal(err)
	}
	rows := ForNeeds([]Need{{noon.Add(50 * time.Minute), noon.Add(70 * time.Minute), bodies}}, astro.DeltaT)
	var got []string
	for _, r := range rows {
		got = append(got, r.Body.String()+r.Time.Format(" 15"))
	}
	if want := "Aries 12, Aries 13, Moon 12, Moon 13, Altair 12, Vega 12"; strings.Join(got, ", ") != want {
		t.Errorf("%v, want %s", got, want)
	}
	moon := ForNeeds([]Need{{noon, noon, []astro.Body{astro.Moon}}}, astro.DeltaT)
	if len(moon) != 1 || moon[0].Body != astro.Moon {
		t.Errorf("%d rows for the Moon at a full hour, want 1", len(moon))
	}
}

const goodPlan = `{"format":"gloam/plan/1","windows":[
 {"id":"a","begin":"2027-03-01T18:00:00Z","end":"2027-03-01T18:30:00Z","bodies":[{"body":"Mars"},{"body":"Vega"}],"triads":[{"bodies":["Vega","Moon","Altair"]}],"round":[{"body":"Sirius"}]},
 {"id":"b","begin":"2027-03-02T18:00:00Z","end":"2027-03-02T18:30:00Z","bodies":[{"body":"Mars"}],"triads":[],"round":[]}]}`

func TestReadNeeds(t *testing.T) {
	needs, err := ReadNeeds(strings.NewReader(goodPlan))
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, n := range needs {
		for _, b := range n.Bodies {
			got = append(got, b.String())
		}
		got = append(got, "|")
	}
	if want := "Moon Altair Sirius Vega | Mars |"; strings.Join(got, " ") != want {
		t.Errorf("%v, want %s", got, want)
	}
}

func TestReadNeedsRefuses(t *testing.T) {
	for text, want := range map[string]string{
		"":                   "not a plan",
		"[]":                 "not a plan",
		`{"format":"other"}`: `format "other"`,
		`{"type":"Feature"}`: `format ""`,
		strings.Replace(goodPlan, `"Moon"`, `"Pluto"`, 1):                    `body "Pluto"`,
		strings.Replace(goodPlan, "2027-03-01T18:30", "2027-03-01T17:30", 1): "in order",
		strings.Replace(goodPlan, "2027-03-01T18:30", "2927-03-01T17:30", 1): "1990 to 2100",
		strings.Replace(goodPlan, "2027-03-01T18:30:00Z", "soon", 1):         "not a plan",
	} {
		if _, err := ReadNeeds(strings.NewReader(text)); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%.40q: %v, want %q", text, err, want)
		}
	}
}

func FuzzReadNeeds(f *testing.F) {
	f.Add(goodPlan)
	f.Add(`{"format":"gloam/plan/1","windows":[null,{}]}`)
	f.Fuzz(func(t *testing.T, text string) {
		needs, err := ReadNeeds(strings.NewReader(text))
		for _, n := range needs {
			if err != nil || n.End.Before(n.Begin) || !Serves(n.Begin) || !Serves(n.End) {
				t.Errorf("%v to %v, error %v", n.Begin, n.End, err)
			}
		}
	})
}

// Angles carry: 359° 59.96' is a whole turn, which is nothing.
func TestAnglesCarry(t *testing.T) {
	for minutes, want := range map[float64]string{360*60 - 0.04: "000° 00.0'", 359*60 + 59.94: "359° 59.9'", 12*60 + 29.96: "012° 30.0'"} {
		if got := wide(unit.AngleFromMin(minutes)); got != want {
			t.Errorf("%v' written %s, want %s", minutes, got, want)
		}
	}
	if got := fine(unit.AngleFromMin(360*60 - 0.004)); got != "000° 00.00'" {
		t.Errorf("a whole turn written %s", got)
	}
}

func TestWritersTellOfErrors(t *testing.T) {
	rows := Hours([]astro.Body{astro.Sun}, noon, 1, astro.DeltaT)
	for name, write := range map[string]func(io.Writer) error{
		"text": func(w io.Writer) error { return WriteText(w, rows) },
		"CSV":  func(w io.Writer) error { return WriteCSV(w, rows) },
		"JSON": func(w io.Writer) error { return WriteJSON(w, rows) },
		"worked": func(w io.Writer) error {
			return WriteWorked(w, []astro.Worked{astro.Work(astro.Sun, noon, astro.DeltaT)})
		},
	} {
		if write(fullDisk{}) == nil {
			t.Errorf("%s: a failing writer went unnoticed", name)
		}
	}
}

type fullDisk struct{}

func (fullDisk) Write([]byte) (int, error) { return 0, errors.New("no space left") }
