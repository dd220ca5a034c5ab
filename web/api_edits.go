package web

import (
	"context"
	"errors"
	"net/http"
	"time"

	"github.com/go-json-experiment/json/jsontext"
	"github.com/google/uuid"

	"loopwright/schematic"
	"loopwright/web/store"
)

// editSheet answers POST /api/v1/sheets/{key}/edits: applies a batch of edits, whole or not at all, and answers once it
// is durable.
func (s *Server) editSheet(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r, store.Edit)
	if err != nil {
		return err
	}
	data, err := readBody(r)
	if err != nil {
		return err
	}
	var sent sentBatch
	if err := decode(data, &sent); err != nil {
		return err
	}
	answer, err := s.commit(r.Context(), access, sent)
	if err != nil {
		return err
	}
	return writeJSON(w, http.StatusOK, answer)
}

// sentBatch is a batch of edits as it is sent.
type sentBatch struct {
	ID     string         `json:"id"` // UUID
	Base   int            `json:"base"`
	Author string         `json:"author"` // UUID; empty for whoever holds the key
	Edits  jsontext.Value `json:"edits"`
}

// commit applies a batch of edits for the holder of a key. A conflict comes as a problem that holds the newest revision.
func (s *Server) commit(ctx context.Context, access store.Access, sent sentBatch) (store.Answer, error) {
	batch, err := sent.batch(access)
	if err != nil {
		return store.Answer{}, err
	}
	start := time.Now()
	answer, err := s.store.Commit(ctx, access.Sheet, batch)
	s.meters.edits.Update(time.Since(start).Seconds())
	if conflict := (*schematic.ConflictError)(nil); errors.As(err, &conflict) {
		return store.Answer{}, &problem{status: http.StatusConflict, message: conflict.Message, revision: answer.Revision}
	}
	return answer, err
}

// batch checks what was sent.
func (b *sentBatch) batch(access store.Access) (store.Batch, error) {
	id, err := identity("id", b.ID)
	if err != nil {
		return store.Batch{}, err
	}
	author := "key " + access.KeyName
	if b.Author != "" {
		named, err := identity("author", b.Author)
		if err != nil {
			return store.Batch{}, err
		}
		author = named.String()
	}
	if b.Base < 0 {
		return store.Batch{}, &schematic.PlaceError{Place: "base", Message: "a revision is not negative"}
	}
	if b.Edits.Kind() != '[' {
		return store.Batch{}, &schematic.PlaceError{Place: "edits", Message: "a batch needs a list of edits"}
	}
	edits, err := schematic.DecodeEdits(b.Edits)
	if err != nil {
		return store.Batch{}, err
	}
	if len(edits) == 0 {
		return store.Batch{}, &schematic.PlaceError{Place: "edits", Message: "a batch needs at least one edit"}
	}
	return store.Batch{ID: id, Base: b.Base, Author: author, Edits: edits, Record: b.Edits}, nil
}

// identity reads a UUID in its usual form of 36 characters.
func identity(place, text string) (uuid.UUID, error) {
	id, err := uuid.Parse(text)
	if err != nil || len(text) != 36 {
		return uuid.UUID{}, &schematic.PlaceError{Place: place,
			Message: `a UUID is needed here, such as "5c1f1d0e-7f2b-4a52-9d3c-0a4d5be5f6a1"`}
	}
	return id, nil
}
