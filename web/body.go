package web

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"net/http"
	"strings"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"

	"loopwright/schematic"
)

// readJSON reads the body of a request. What is no JSON gives status 400; JSON in which a name is given twice is left to
// whoever understands it.
func readJSON(r *http.Request) ([]byte, error) {
	data, err := io.ReadAll(r.Body)
	if err != nil {
		if tooLarge := (*http.MaxBytesError)(nil); errors.As(err, &tooLarge) {
			return nil, err
		}
		return nil, &problem{status: http.StatusBadRequest, message: "The request ended before it was whole; send it again."}
	}
	var whole jsontext.Value
	if err := json.Unmarshal(data, &whole, jsontext.AllowDuplicateNames(true)); err != nil {
		line := 1
		if syntax := (*jsontext.SyntacticError)(nil); errors.As(err, &syntax) {
			line += bytes.Count(data[:min(int(syntax.ByteOffset), len(data))], []byte("\n"))
		}
		return nil, &problem{status: http.StatusBadRequest,
			message: fmt.Sprintf("This is not JSON: reading it stopped in line %d. Send one JSON value in UTF-8.", line)}
	}
	return data, nil
}

// decode reads the fields of an object that readJSON has let pass, and refuses any that the object does not have.
func decode(data []byte, to any) error {
	err := json.Unmarshal(data, to, json.RejectUnknownMembers(true))
	if err == nil {
		return nil
	}
	refused := &schematic.PlaceError{Message: "this is not an object of the fields that belong here"}
	var syntax *jsontext.SyntacticError
	var semantic *json.SemanticError
	switch {
	case errors.As(err, &syntax):
		refused.Place = strings.TrimPrefix(string(syntax.JSONPointer), "/")
		refused.Message = "the field is given twice; leave one out"
	case errors.As(err, &semantic) && semantic.JSONPointer != "":
		refused.Place = strings.TrimPrefix(string(semantic.JSONPointer), "/")
		refused.Message = "there is no such field here; leave it out"
		if !errors.Is(err, json.ErrUnknownName) {
			refused.Message = fmt.Sprintf("a JSON %s does not belong here", kindName(semantic.JSONKind))
		}
	}
	return refused
}

// kindName says what sort of JSON value it is.
func kindName(kind jsontext.Kind) string {
	switch kind {
	case '"':
		return "string"
	case '0':
		return "number of that form"
	case '{':
		return "object"
	case '[':
		return "list"
	}
	return kind.String()
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
