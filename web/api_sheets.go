package web

import (
	"net/http"

	"github.com/go-json-experiment/json/jsontext"

	"loopwright/schematic"
	"loopwright/web/store"
)

// solveBody answers POST /api/v1/solve: the solution of the sheet in the body. Nothing is stored.
func (s *Server) solveBody(w http.ResponseWriter, r *http.Request) error {
	sheet, err := readSheet(r)
	if err != nil {
		return err
	}
	result, err := s.solve(r.Context(), sheet)
	if err != nil {
		return err
	}
	return writeJSON(w, http.StatusOK, result)
}

func readSheet(r *http.Request) (*schematic.Sheet, error) {
	data, err := readBody(r)
	if err != nil {
		return nil, err
	}
	return schematic.Decode(data)
}

// createSheet answers POST /api/v1/sheets: stores the sheet in the body and gives its edit key.
func (s *Server) createSheet(w http.ResponseWriter, r *http.Request) error {
	sheet, err := readSheet(r)
	if err != nil {
		return err
	}
	_, key, revision, err := s.store.Create(r.Context(), sheet)
	if err != nil {
		return err
	}
	w.Header().Set("Location", "/api/v1/sheets/"+key)
	return writeJSON(w, http.StatusCreated, struct {
		Key      string `json:"edit_key"`
		Revision int    `json:"revision"`
	}{key, revision})
}

// showSheet answers GET /api/v1/sheets/{key}: the newest revision of the sheet.
func (s *Server) showSheet(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	sheet, revision, err := s.store.Sheet(r.Context(), access.Sheet)
	if err != nil {
		return err
	}
	return writeJSON(w, http.StatusOK, struct {
		Sheet    jsontext.Value `json:"sheet"`
		Revision int            `json:"revision"`
		Role     store.Role     `json:"role"`
	}{schematic.Encode(sheet), revision, access.Role})
}

// showSolution answers GET /api/v1/sheets/{key}/solution: the solution of the newest revision.
func (s *Server) showSolution(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	solved, err := s.solved(r.Context(), access.Sheet, access.Revision)
	if err != nil {
		return err
	}
	return writeJSON(w, http.StatusOK, solved.Result)
}
