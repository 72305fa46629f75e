package track

import (
	"bufio"
	"bytes"
	"fmt"
	"io"
)

// MaxRouteBytes is the size over which a route file is refused: room for a
// track of half a million points.
const MaxRouteBytes = 96 << 20

// Read reads a route in any of the formats known, told apart by what is in the
// file: GeoJSON, see [ReadGeoJSON]; GPX 1.0 and 1.1, see [ReadGPX]; RTZ 1.0 to
// 1.2, see [ReadRTZ]. Errors are of type *[Error], but for those of r.
func Read(r io.Reader) (*Route, error) {
	in := bufio.NewReader(limited(r))
	start, err := in.Peek(512)
	if err != nil && err != io.EOF {
		return nil, err
	}
	switch start = bytes.TrimLeft(bytes.TrimPrefix(start, byteOrderMark), " \t\r\n"); {
	case bytes.HasPrefix(start, []byte("<")):
		return readXML(in, gpxRoot, rtzRoot)
	case bytes.HasPrefix(start, []byte("\xff\xfe")), bytes.HasPrefix(start, []byte("\xfe\xff")):
		return nil, &Error{"file", "UTF-16", "UTF-8", "save the file as UTF-8"}
	}
	return ReadGeoJSON(in)
}

var byteOrderMark = []byte("\xef\xbb\xbf")

// limited refuses what goes beyond MaxRouteBytes.
func limited(r io.Reader) io.Reader { return &limitedReader{r, MaxRouteBytes} }

type limitedReader struct {
	r    io.Reader
	left int64
}

func (l *limitedReader) Read(p []byte) (int, error) {
	if l.left < 0 {
		return 0, &Error{"file", fmt.Sprintf("over %d MB", MaxRouteBytes>>20), "a route file is at most that", "export the route alone, without tracks or charts"}
	}
	p = p[:min(int64(len(p)), l.left+1)]
	n, err := l.r.Read(p)
	l.left -= int64(n)
	return n, err
}
