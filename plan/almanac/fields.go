package almanac

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"io"
	"strconv"
	"time"

	"gloam/astro"
)

// field is one value of a row as CSV and JSON print it; the text is empty where
// it does not apply to the body.
type field struct{ name, text string }

// fields gives a row's values in order.
func fields(h astro.Hourly) []field {
	class := h.Body.Class()
	solar := h.Body.HasD()
	number := func(name string, applies bool, value float64, decimals int) field {
		if !applies {
			return field{name, ""}
		}
		return field{name, strconv.FormatFloat(value, 'f', decimals, 64)}
	}
	return []field{
		{"time", h.Time.UTC().Format(time.RFC3339)},
		{"body", h.Body.String()},
		number("gha_deg", true, h.GHA.Deg(), 5),
		number("dec_deg", class != astro.ClassPoint, h.Dec.Deg(), 5),
		number("hp_arcmin", solar, h.HP.Min(), 3),
		number("sd_arcmin", solar, h.SD.Min(), 3),
		number("v_arcmin", h.Body.HasV(), h.V.Min(), 2),
		number("d_arcmin", solar, h.D.Min(), 2),
		number("sha_deg", class == astro.ClassStar, h.SHA.Deg(), 5),
		number("magnitude", class != astro.ClassPoint, h.Magnitude, 2),
		number("illuminated_fraction", h.Body.HasV(), h.Illuminated, 4),
	}
}

// WriteCSV writes rows as CSV with a line of names; d is positive northward.
func WriteCSV(w io.Writer, rows []astro.Hourly) error {
	var b bytes.Buffer
	out := csv.NewWriter(&b)
	line := func(pick func(field) string, h astro.Hourly) {
		var record []string
		for _, f := range fields(h) {
			record = append(record, pick(f))
		}
		_ = out.Write(record) // to memory
	}
	line(func(f field) string { return f.name }, astro.Hourly{})
	for _, h := range rows {
		line(func(f field) string { return f.text }, h)
	}
	out.Flush()
	_, err := w.Write(b.Bytes())
	return err
}

// WriteJSON writes rows as a JSON list of objects, one a line; values that do
// not apply are left out. d is positive northward.
func WriteJSON(w io.Writer, rows []astro.Hourly) error {
	var b bytes.Buffer
	b.WriteString("[")
	for i, h := range rows {
		separator := ",\n "
		if i == 0 {
			separator = "\n "
		}
		b.WriteString(separator + "{")
		for j, f := range fields(h) {
			if f.text == "" {
				continue
			}
			if j > 0 {
				b.WriteString(",")
			}
			text := f.text
			if j < 2 { // time and body
				quoted, err := json.Marshal(text)
				if err != nil {
					return err
				}
				text = string(quoted)
			}
			b.WriteString(strconv.Quote(f.name) + ":" + text)
		}
		b.WriteString("}")
	}
	b.WriteString("\n]\n")
	_, err := w.Write(b.Bytes())
	return err
}
