// Package coefficients reads the coefficient files from which the tables of
// the planetary and lunar theories are packed. Only the packing programs use
// it.
//
// The files come from the npm package astronomia 4.2.0 (MIT), whose data are
// made from the theories' own.
package coefficients

import (
	"encoding/json"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
)

const source = "astronomia@4.2.0"

// Folder gives the folder of an unpacked package: src, or where that is empty
// a temporary one filled with npm. The function returned removes what was
// made.
func Folder(src string) (data string, done func(), err error) {
	if src != "" {
		return filepath.Join(src, "data"), func() {}, nil
	}
	dir, err := os.MkdirTemp("", "coefficients")
	if err != nil {
		return "", nil, err
	}
	done = func() { os.RemoveAll(dir) }
	if out, err := exec.Command("npm", "install", "--no-save", "--prefix", dir, source).CombinedOutput(); err != nil {
		done()
		return "", nil, fmt.Errorf("npm: %w\n%s", err, out)
	}
	return filepath.Join(dir, "node_modules", "astronomia", "data"), done, nil
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
