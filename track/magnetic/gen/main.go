// Command gen builds the table that package magnetic embeds from the
// coefficients of the World Magnetic Model 2025 in the npm package geomagnetism
// 0.2.0 (Apache-2.0; the coefficients are public domain).
package main

import (
	"encoding/json"
	"flag"
	"fmt"
	"log"
	"os"
	"strings"
)

func main() {
	src := flag.String("src", "node_modules/geomagnetism/data/wmm-2025.json", "the model's file in the npm package")
	flag.Parse()
	if err := build(*src, "wmm2025.txt"); err != nil {
		log.Fatal(err)
	}
}

func build(src, dst string) error {
	data, err := os.ReadFile(src)
	if err != nil {
		return err
	}
	var m struct {
		G  []float64 `json:"main_field_coeff_g"`
		H  []float64 `json:"main_field_coeff_h"`
		DG []float64 `json:"secular_var_coeff_g"`
		DH []float64 `json:"secular_var_coeff_h"`
	}
	if err := json.Unmarshal(data, &m); err != nil {
		return err
	}
	var b strings.Builder
	for n := 1; n <= 12; n++ {
		for k := 0; k <= n; k++ {
			i := n*(n+1)/2 + k
			fmt.Fprintln(&b, n, k, m.G[i], m.H[i], m.DG[i], m.DH[i])
		}
	}
	return os.WriteFile(dst, []byte(b.String()), 0o666)
}
