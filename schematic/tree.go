package schematic

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"strconv"
	"unicode/utf8"
)

// PlaceError is what is wrong with a sheet or an edit, and where.
type PlaceError struct {
	Place   string // "parts[3].values.resistance"; empty for the whole
	Message string // one sentence: what is wrong and what to do
}

func (e *PlaceError) Error() string {
	if e.Place == "" {
		return e.Message
	}
	return e.Place + ": " + e.Message
}

// refuse makes a PlaceError.
func refuse(place, format string, arguments ...any) error {
	return &PlaceError{place, fmt.Sprintf(format, arguments...)}
}

// member is one field of a JSON object; order and doubles are kept, which encoding/json would lose.
type member struct {
	key   string
	value any
}

// object is a JSON object; arrays are []any, and numbers are float64.
type object []member

// deepest is how deep JSON may be nested; a sheet needs six levels.
const deepest = 16

// parse reads JSON into objects, arrays and plain values, and refuses what encoding/json would let pass: a byte order
// mark, text that is not UTF-8, a field given twice, and anything after the end.
func parse(data []byte) (any, error) {
	switch {
	case bytes.HasPrefix(data, []byte("\xef\xbb\xbf")):
		return nil, refuse("", "the file begins with a byte order mark; save it as UTF-8 without one")
	case !utf8.Valid(data):
		return nil, refuse("", "the file is not UTF-8; save it as UTF-8")
	}
	p := parser{decoder: json.NewDecoder(bytes.NewReader(data)), data: data}
	p.decoder.UseNumber()
	value, err := p.value("", 0)
	if err != nil {
		return nil, err
	}
	if _, err := p.decoder.Token(); !errors.Is(err, io.EOF) {
		return nil, p.syntax(errors.New("there is something after the end of the sheet"))
	}
	return value, nil
}

type parser struct {
	decoder *json.Decoder
	data    []byte
}

// SyntaxError is JSON that cannot be read at all.
type SyntaxError struct{ PlaceError }

func (p *parser) syntax(err error) error {
	line := 1 + bytes.Count(p.data[:min(int64(len(p.data)), p.decoder.InputOffset())], []byte("\n"))
	reason := err.Error()
	if errors.Is(err, io.EOF) || errors.Is(err, io.ErrUnexpectedEOF) {
		reason = "it ends too early"
	}
	return &SyntaxError{PlaceError{"line " + strconv.Itoa(line), "this is no JSON: " + reason}}
}

func (p *parser) value(place string, depth int) (any, error) {
	token, err := p.decoder.Token()
	if err != nil {
		return nil, p.syntax(err)
	}
	if depth > deepest {
		return nil, refuse(place, "it is nested too deep")
	}
	switch token := token.(type) {
	case json.Delim:
		if token == '[' {
			return p.array(place, depth)
		}
		return p.object(place, depth)
	case json.Number:
		number, err := strconv.ParseFloat(token.String(), 64)
		if err != nil {
			return nil, refuse(place, "the number %s is too large", token)
		}
		return number, nil
	}
	return token, nil
}

func (p *parser) array(place string, depth int) (any, error) {
	list := []any{}
	for p.decoder.More() {
		value, err := p.value(at(place, len(list)), depth+1)
		if err != nil {
			return nil, err
		}
		list = append(list, value)
	}
	return list, p.closing()
}

func (p *parser) object(place string, depth int) (any, error) {
	fields := object{}
	seen := map[string]bool{}
	for p.decoder.More() {
		token, err := p.decoder.Token()
		if err != nil {
			return nil, p.syntax(err)
		}
		key := token.(string) // the decoder refuses any other key
		if seen[key] {
			return nil, refuse(under(place, key), "the field is given twice; leave one out")
		}
		seen[key] = true
		value, err := p.value(under(place, key), depth+1)
		if err != nil {
			return nil, err
		}
		fields = append(fields, member{key, value})
	}
	return fields, p.closing()
}

// closing takes the bracket that ends an array or an object.
func (p *parser) closing() error {
	if _, err := p.decoder.Token(); err != nil {
		return p.syntax(err)
	}
	return nil
}

// under is the place of a field.
func under(place, key string) string {
	if place == "" {
		return key
	}
	return place + "." + key
}

// at is the place of an item of a list.
func at(place string, index int) string { return place + "[" + strconv.Itoa(index) + "]" }

// readers says how each field of an object is read.
type readers map[string]func(value any, place string) error

// readFields takes an object apart; fields without a reader and null are refused.
func readFields(value any, place, what string, fields readers) error {
	members, ok := value.(object)
	if !ok {
		return refuse(place, "write %s as an object in braces", what)
	}
	for _, m := range members {
		read, known := fields[m.key]
		here := under(place, m.key)
		if !known {
			return refuse(here, "%s has no field of this name; leave it out", what)
		}
		if m.value == nil {
			return refuse(here, "null is no value; leave the field out")
		}
		if err := read(m.value, here); err != nil {
			return err
		}
	}
	return nil
}

// has reports whether an object has a field.
func has(value any, key string) bool {
	members, _ := value.(object)
	for _, m := range members {
		if m.key == key {
			return true
		}
	}
	return false
}

// list reads each item of an array.
func list(value any, place string, each func(item any, place string) error) error {
	items, ok := value.([]any)
	if !ok {
		return refuse(place, "write a list in square brackets")
	}
	for i, item := range items {
		if err := each(item, at(place, i)); err != nil {
			return err
		}
	}
	return nil
}

// furthest bounds how far from the origin anything may lie, in grid steps.
const furthest = 100000

func readWhole(value any, place string) (int, error) {
	number, ok := value.(float64)
	if !ok || number != float64(int(number)) {
		return 0, refuse(place, "write a whole number of grid steps")
	}
	if number > furthest || number < -furthest {
		return 0, refuse(place, "the place is more than %d grid steps away", furthest)
	}
	return int(number), nil
}

func readPoint(value any, place string) (Point, error) {
	items, ok := value.([]any)
	if !ok || len(items) != 2 {
		return Point{}, refuse(place, "write a place as [x, y]")
	}
	x, err := readWhole(items[0], at(place, 0))
	if err != nil {
		return Point{}, err
	}
	y, err := readWhole(items[1], at(place, 1))
	return Point{x, y}, err
}

// intoText reads a text into a string.
func intoText(target *string) func(any, string) error {
	return func(value any, place string) error {
		text, ok := value.(string)
		if !ok {
			return refuse(place, "write it as text")
		}
		*target = text
		return nil
	}
}

// intoPoint reads a place into a Point.
func intoPoint(target *Point) func(any, string) error {
	return func(value any, place string) (err error) {
		*target, err = readPoint(value, place)
		return err
	}
}

// intoPoints reads a list of places.
func intoPoints(target *[]Point) func(any, string) error {
	return func(value any, place string) error {
		return list(value, place, func(item any, place string) error {
			p, err := readPoint(item, place)
			*target = append(*target, p)
			return err
		})
	}
}

// intoTexts reads a list of texts.
func intoTexts(target *[]string) func(any, string) error {
	return func(value any, place string) error {
		return list(value, place, func(item any, place string) error {
			var text string
			err := intoText(&text)(item, place)
			*target = append(*target, text)
			return err
		})
	}
}
