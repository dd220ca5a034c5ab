package schematic

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strconv"
	"unicode/utf8"

	"github.com/go-json-experiment/json/jsontext"
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

// atPlace gives a PlaceError another place, and other errors as they are.
func atPlace(err error, place string) error {
	if wrong := (*PlaceError)(nil); errors.As(err, &wrong) {
		return &PlaceError{place, wrong.Message}
	}
	return err
}

// below puts the place of a PlaceError below another place, and gives other errors as they are.
func below(err error, place string) error {
	if err == nil {
		return nil
	}
	if wrong := (*PlaceError)(nil); errors.As(err, &wrong) {
		return &PlaceError{under(place, wrong.Place), wrong.Message}
	}
	return err
}

// SyntaxError is text that is no JSON at all. It is a PlaceError too, whose place is a line.
type SyntaxError struct{ PlaceError }

// Unwrap gives the PlaceError.
func (e *SyntaxError) Unwrap() error { return &e.PlaceError }

func noJSON(place, reason string) error {
	return &SyntaxError{PlaceError{place, "this is no JSON: " + reason}}
}

// member is one field of a JSON object; their order is kept, so that the first mistake of a file is the one that is told.
type member struct {
	key   string
	value any
}

// object is a JSON object; arrays are []any, and numbers are float64.
type object []member

// deepest is how deep JSON may be nested; a batch of edits needs six levels.
const deepest = 16

// parse reads JSON into objects, arrays and plain values. It refuses a byte order mark, text that is not UTF-8, a field
// given twice, and anything after the end.
func parse(data []byte) (any, error) {
	switch {
	case bytes.HasPrefix(data, []byte("\ufeff")):
		return nil, noJSON("", "it begins with a byte order mark; save it as UTF-8 without one")
	case !utf8.Valid(data):
		return nil, noJSON("", "it is not UTF-8; save it as UTF-8")
	}
	p := parser{jsontext.NewDecoder(bytes.NewBuffer(data), jsontext.AllowDuplicateNames(true)), data}
	value, err := p.value()
	if err != nil {
		return nil, err
	}
	if _, err := p.decoder.ReadToken(); !errors.Is(err, io.EOF) {
		return nil, noJSON(p.line(p.decoder.InputOffset()), "there is something after its end; take it away")
	}
	return value, nil
}

type parser struct {
	decoder *jsontext.Decoder
	data    []byte
}

// syntax says in our words what the decoder found.
func (p *parser) syntax(err error) error {
	offset, reason := p.decoder.InputOffset(), err.Error()
	if wrong := (*jsontext.SyntacticError)(nil); errors.As(err, &wrong) {
		offset, reason = wrong.ByteOffset, wrong.Err.Error()
	}
	if errors.Is(err, io.EOF) || errors.Is(err, io.ErrUnexpectedEOF) {
		reason = "it ends too early"
	}
	return noJSON(p.line(offset), reason)
}

// line names the line that a byte is on.
func (p *parser) line(offset int64) string {
	return "line " + strconv.Itoa(1+bytes.Count(p.data[:min(int64(len(p.data)), offset)], []byte("\n")))
}

// place names the value that was read last.
func (p *parser) place() string {
	place := ""
	depth := 0
	for token := range p.decoder.StackPointer().Tokens() {
		depth++
		if kind, _ := p.decoder.StackIndex(depth); kind == '[' {
			place += "[" + token + "]"
		} else {
			place = under(place, token)
		}
	}
	return place
}

func (p *parser) value() (any, error) {
	token, err := p.decoder.ReadToken()
	if err != nil {
		return nil, p.syntax(err)
	}
	if p.decoder.StackDepth() > deepest {
		return nil, refuse(p.place(), "it is nested too deep")
	}
	switch token.Kind() {
	case '{':
		return p.object()
	case '[':
		return p.array()
	case '"':
		return token.String(), nil
	case '0':
		number, err := strconv.ParseFloat(token.String(), 64)
		if err != nil {
			return nil, refuse(p.place(), "the number is too large")
		}
		return number, nil
	case 'n':
		return nil, nil
	}
	return token.Bool(), nil
}

func (p *parser) array() (any, error) {
	list := []any{}
	for p.decoder.PeekKind() != ']' {
		value, err := p.value()
		if err != nil {
			return nil, err
		}
		list = append(list, value)
	}
	return list, p.closing()
}

// few is how many fields are searched one after the other, because that is faster than a map.
const few = 16

func (p *parser) object() (any, error) {
	fields := object{}
	var seen map[string]bool
	for p.decoder.PeekKind() != '}' {
		token, err := p.decoder.ReadToken()
		if err != nil {
			return nil, p.syntax(err)
		}
		key := token.String()
		if len(fields) == few {
			seen = make(map[string]bool, 2*few)
			for _, m := range fields {
				seen[m.key] = true
			}
		}
		if seen[key] || (seen == nil && has(fields, key)) {
			return nil, refuse(p.place(), "the field is given twice; leave one out")
		}
		if seen != nil {
			seen[key] = true
		}
		value, err := p.value()
		if err != nil {
			return nil, err
		}
		fields = append(fields, member{key, value})
	}
	return fields, p.closing()
}

// closing takes the bracket that ends an array or an object.
func (p *parser) closing() error {
	if _, err := p.decoder.ReadToken(); err != nil {
		return p.syntax(err)
	}
	return nil
}
