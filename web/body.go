package web

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"net/http"
	"reflect"
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"

	"loopwright/schematic"
)

// readBody reads the body of a request, which is to be JSON: in UTF-8, without a byte order mark (RFC 8259, section 8.1).
// Whether it is JSON shows to whoever understands it.
func readBody(r *http.Request) ([]byte, error) {
	data, err := io.ReadAll(r.Body)
	if tooLarge := (*http.MaxBytesError)(nil); errors.As(err, &tooLarge) {
		return nil, err
	}
	if err != nil {
		return nil, &problem{status: http.StatusBadRequest, message: "The request ended before it was whole; send it again."}
	}
	if !utf8.Valid(data) || bytes.HasPrefix(data, []byte("\ufeff")) {
		return nil, &problem{status: http.StatusBadRequest, message: "This is not JSON: send it in UTF-8, without a byte order mark."}
	}
	return data, nil
}

// readForm reads the fields that a page sends.
func readForm(r *http.Request) error {
	err := r.ParseForm()
	if tooLarge := (*http.MaxBytesError)(nil); err == nil || errors.As(err, &tooLarge) {
		return err
	}
	return &problem{status: http.StatusBadRequest, message: "What the page sent cannot be read; load the page again."}
}

// decode reads an object, and refuses fields that it does not have.
func decode(data []byte, to any) error {
	err := json.Unmarshal(data, to, json.RejectUnknownMembers(true))
	var syntax *jsontext.SyntacticError
	var semantic *json.SemanticError
	switch {
	case err == nil:
		return nil
	case errors.Is(err, jsontext.ErrDuplicateName) && errors.As(err, &syntax):
		return &schematic.PlaceError{Place: placeOf(syntax.JSONPointer), Message: "the field is given twice; leave one out"}
	case errors.As(err, &syntax):
		line := 1 + bytes.Count(data[:min(int(syntax.ByteOffset), len(data))], []byte("\n"))
		return &problem{status: http.StatusBadRequest, place: fmt.Sprint("line ", line), message: "This is not JSON."}
	case errors.Is(err, json.ErrUnknownName) && errors.As(err, &semantic):
		return &schematic.PlaceError{Place: placeOf(semantic.JSONPointer), Message: "there is no such field here; leave it out"}
	case errors.As(err, &semantic):
		return &schematic.PlaceError{Place: placeOf(semantic.JSONPointer), Message: wanted(semantic.GoType)}
	}
	return err
}

// placeOf writes a pointer as places are written elsewhere: "edits[0].part.kind".
func placeOf(pointer jsontext.Pointer) string {
	var place strings.Builder
	for token := range pointer.Tokens() {
		if _, err := strconv.Atoi(token); err == nil {
			place.WriteString("[" + token + "]")
			continue
		}
		if place.Len() > 0 {
			place.WriteByte('.')
		}
		place.WriteString(token)
	}
	return place.String()
}

// wanted says what is to be written where something else was.
func wanted(target reflect.Type) string {
	kind := reflect.Struct
	if target != nil {
		kind = target.Kind()
	}
	switch kind {
	case reflect.String:
		return "write a text in quotation marks here"
	case reflect.Int:
		return "write a whole number here"
	}
	return "write an object in braces here"
}

// writeJSON answers a value as JSON. Nothing is written when it cannot be encoded.
func writeJSON(w http.ResponseWriter, status int, value any) error {
	data, err := json.Marshal(value)
	if err != nil {
		return fmt.Errorf("encoding an answer: %w", err)
	}
	sendJSON(w, status, data)
	return nil
}

func sendJSON(w http.ResponseWriter, status int, data []byte) {
	w.Header().Set("Content-Type", "application/json")
	w.WriteHeader(status)
	w.Write(data) // when that fails, the reader has gone
}
