// Package coefficients reads the coefficient files from which the tables of
// the planetary and lunar theories are packed. Only the packing programs use
// it.
//
// The files come from the npm package astronomia 4.2.0 (MIT), whose data are
// made from the theories' own.
package coefficients

import (
	"encoding/json"
	"flag"
	"fmt"
	"log"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
)

const source = "astronomia@4.2.0"

// Main is the main function of a packing program: it hands the folder of the
// coefficient files to pack and writes what that gives to the file of the flag
// -out. The folder is that of an unpacked package (-src), or a temporary one
// filled with npm.
func Main(pack func(folder string) ([]byte, error)) {
	log.SetFlags(0)
	src := flag.String("src", "", "unpacked npm package; fetched with npm where empty")
	out := flag.String("out", "", "file to write")
	flag.Parse()
	if err := run(*src, *out, pack); err != nil {
		log.Fatal(err)
	}
}

func run(src, out string, pack func(string) ([]byte, error)) error {
	if src == "" {
		dir, err := os.MkdirTemp("", "coefficients")
		if err != nil {
			return err
		}
		defer os.RemoveAll(dir)
		if out, err := exec.Command("npm", "install", "--no-save", "--prefix", dir, source).CombinedOutput(); err != nil {
			return fmt.Errorf("npm: %w\n%s", err, out)
		}
		src = filepath.Join(dir, "node_modules", "astronomia")
	}
	packed, err := pack(filepath.Join(src, "data"))
	if err != nil {
		return err
	}
	return os.WriteFile(out, packed, 0o644)
}

var (
	object = regexp.MustCompile(`(?s)\{.*\}`)
	key    = regexp.MustCompile(`(?m)^\s*([A-Za-z]\w*):`)
)

// Read gives the members of the one object in a file of the form "const m =
// {L: {"0": [...]}, ...}; export default m;".
func Read(path string) (map[string]json.RawMessage, error) {
	b, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	var m map[string]json.RawMessage
	if err := json.Unmarshal(key.ReplaceAll(object.Find(b), []byte(`"$1":`)), &m); err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	return m, nil
}

// Apart is the angle between two directions, in minutes of arc.
func Apart(a, b [3]float64) float64 {
	across := math.Hypot(math.Hypot(a[1]*b[2]-a[2]*b[1], a[2]*b[0]-a[0]*b[2]), a[0]*b[1]-a[1]*b[0])
	return math.Atan2(across, a[0]*b[0]+a[1]*b[1]+a[2]*b[2]) * 180 / math.Pi * 60
}
