package track

import (
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
	"time"
)

// maxDepth is how deep elements may stand in each other.
const maxDepth = 32

// xmlRoot is a kind of document: the name of its root element, its namespaces
// (none is taken too), and what reads the rest.
type xmlRoot struct {
	name   string
	spaces []string
	read   func(*xmlReader, xml.StartElement) (*Route, error)
}

// xmlReader reads elements strictly. Entities other than XML's own five are
// refused by the decoder, document types here.
type xmlReader struct {
	dec   *xml.Decoder
	depth int
	notes []string
}

// readXML reads a document whose root is one of some kinds.
func readXML(r io.Reader, roots ...xmlRoot) (*Route, error) {
	x := &xmlReader{dec: xml.NewDecoder(r)}
	start, err := x.root()
	if err != nil {
		return nil, err
	}
	var names []string
	for _, root := range roots {
		names = append(names, root.name+" of "+root.spaces[0])
		if start.Name.Local != root.name {
			continue
		}
		if space := start.Name.Space; space != "" && !slices.Contains(root.spaces, space) {
			return nil, x.refuse("element "+root.name, "namespace "+shorten(space), strings.Join(root.spaces, " or "))
		}
		return x.whole(start, root)
	}
	return nil, x.refuse("root element", shorten(start.Name.Local), strings.Join(names, ", or "))
}

// whole reads the root and sees that nothing follows it.
func (x *xmlReader) whole(start xml.StartElement, root xmlRoot) (*Route, error) {
	r, err := root.read(x, start)
	if err != nil {
		return nil, err
	}
	for {
		switch t, err := x.token(); {
		case errors.Is(err, io.EOF):
			r.Notes = append(x.notes, r.Notes...)
			return r, nil
		case err != nil:
			return nil, err
		default:
			if _, ok := t.(xml.StartElement); ok {
				return nil, x.refuse("file", "a second root element", "one")
			}
		}
	}
}

func (x *xmlReader) root() (xml.StartElement, error) {
	for {
		t, err := x.token()
		if errors.Is(err, io.EOF) {
			return xml.StartElement{}, x.refuse("file", "no element", "a route as XML")
		}
		if err != nil {
			return xml.StartElement{}, err
		}
		if start, ok := t.(xml.StartElement); ok {
			return start, nil
		}
	}
}

// token reads on; its errors are of type *[Error], but for io.EOF and those of
// the file.
func (x *xmlReader) token() (xml.Token, error) {
	t, err := x.dec.Token()
	var syntax *xml.SyntaxError
	switch d, isDirective := t.(xml.Directive); {
	case errors.As(err, &syntax):
		return nil, &Error{fmt.Sprintf("line %d", syntax.Line), shorten(syntax.Msg), "XML", "check that the file is whole and unshortened"}
	case err != nil && strings.HasPrefix(err.Error(), "xml: "): // encoding or version
		return nil, x.refuse("file", shorten(strings.TrimPrefix(err.Error(), "xml: ")), "XML 1.0 in UTF-8")
	case isDirective:
		return nil, x.refuse("file", "<!"+shorten(string(d))+">", "no document type: a route needs none")
	}
	return t, err
}

// each calls f for every element inside the one that has begun; f reads it to
// its end.
func (x *xmlReader) each(f func(xml.StartElement) error) error {
	if x.depth++; x.depth > maxDepth {
		return x.refuse("file", "elements nested deeper", fmt.Sprint(maxDepth))
	}
	defer func() { x.depth-- }()
	for {
		t, err := x.token()
		if err != nil {
			return x.cut(err)
		}
		switch t := t.(type) {
		case xml.StartElement:
			if err := f(t); err != nil {
				return err
			}
		case xml.EndElement:
			return nil
		}
	}
}

// skip reads over the element that has begun.
func (x *xmlReader) skip() error {
	return x.each(func(xml.StartElement) error { return x.skip() })
}

// text reads the element that has begun as text; elements in it are skipped.
func (x *xmlReader) text() (string, error) {
	var b strings.Builder
	for {
		t, err := x.token()
		if err != nil {
			return "", x.cut(err)
		}
		switch t := t.(type) {
		case xml.CharData:
			b.Write(t)
		case xml.StartElement:
			if err := x.skip(); err != nil {
				return "", err
			}
		case xml.EndElement:
			return strings.TrimSpace(b.String()), nil
		}
	}
}

// cut turns the end of the file inside an element into an error.
func (x *xmlReader) cut(err error) error {
	if errors.Is(err, io.EOF) {
		return x.refuse("file", "the end in the middle of an element", "a whole document")
	}
	return err
}

// line names the place reached.
func (x *xmlReader) line() string {
	line, _ := x.dec.InputPos()
	return fmt.Sprintf("line %d", line)
}

func (x *xmlReader) refuse(place, met, allowed string) error {
	return &Error{x.line() + ": " + place, met, allowed, "export the route again, as GPX 1.1, RTZ or GeoJSON"}
}

// attribute gives an attribute's value; ok is false where it has none.
func attribute(e xml.StartElement, name string) (value string, ok bool) {
	for _, a := range e.Attr {
		if a.Name.Local == name && a.Name.Space == "" {
			return strings.TrimSpace(a.Value), true
		}
	}
	return "", false
}

// position reads the attributes lat and lon.
func (x *xmlReader) position(e xml.StartElement) (Position, error) {
	lat, err := x.degrees(e, "lat", 90)
	if err != nil {
		return Position{}, err
	}
	lon, err := x.degrees(e, "lon", 180)
	return PositionFromDeg(lat, lon), err
}

func (x *xmlReader) degrees(e xml.StartElement, name string, most float64) (float64, error) {
	text, ok := attribute(e, name)
	place := e.Name.Local + " attribute " + name
	if !ok {
		return 0, x.refuse(place, "missing", "degrees")
	}
	d, err := strconv.ParseFloat(text, 64)
	if err != nil || !(d >= -most && d <= most) {
		return 0, x.refuse(place, fmt.Sprintf("%q", shorten(text)), fmt.Sprintf("degrees, -%v to %v", most, most))
	}
	return d, nil
}

// optionalInstant reads an attribute that is a time; zero where it is missing.
func (x *xmlReader) optionalInstant(e xml.StartElement, name string) (time.Time, error) {
	text, ok := attribute(e, name)
	if !ok || text == "" {
		return time.Time{}, nil
	}
	return x.instant(e.Name.Local+" attribute "+name, text)
}

// instant reads a time, which must have its zone.
func (x *xmlReader) instant(place, text string) (time.Time, error) {
	t, err := time.Parse(time.RFC3339, text)
	if err != nil {
		return t, x.refuse(place, fmt.Sprintf("%q", shorten(text)), "a time with its zone, as 2026-11-20T12:00:00Z")
	}
	return t.UTC(), nil
}
