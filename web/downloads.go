package web

import (
	"mime"
	"net/http"
	"strconv"
	"strings"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/draw"
)

// sendSheetFile answers GET /s/{key}/sheet.json: the sheet as a file.
func (s *Server) sendSheetFile(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	sheet, _, err := s.store.Sheet(r.Context(), access.Sheet)
	if err != nil {
		return err
	}
	name(w, "attachment", sheet, ".sheet.json")
	sendJSON(w, http.StatusOK, schematic.Encode(sheet))
	return nil
}

// sendReadings answers GET /s/{key}/readings.csv: the readings of all cases as a table.
func (s *Server) sendReadings(w http.ResponseWriter, r *http.Request) error {
	solved, err := s.newest(r)
	if err != nil {
		return err
	}
	name(w, "attachment", solved.Sheet, ".readings.csv")
	w.Header().Set("Content-Type", "text/csv; charset=utf-8")
	w.Write(cases.AppendCSV(nil, solved.Result))
	return nil
}

// sendDrawing answers GET /s/{key}/drawing.svg: the drawing with the values of one case, the first unless ?case= names
// another.
func (s *Server) sendDrawing(w http.ResponseWriter, r *http.Request) error {
	solved, err := s.newest(r)
	if err != nil {
		return err
	}
	shown := 0
	if wanted := r.URL.Query().Get("case"); wanted != "" {
		if shown = solved.Sheet.Case(wanted); shown < 0 {
			return &problem{status: http.StatusNotFound, message: "The sheet has no case of that name.", place: "case"}
		}
	}
	name(w, "inline", solved.Sheet, ".svg")
	w.Header().Set("Content-Type", "image/svg+xml")
	picture := draw.Compose(solved.Sheet, solved.Result, draw.Options{
		Case: shown, Meshes: true, Date: s.today(), Revision: strconv.Itoa(solved.Revision),
	})
	w.Write(picture.AppendSVG(nil))
	return nil
}

// newest gives the newest revision of the sheet that the address of a request opens, with its solution.
func (s *Server) newest(r *http.Request) (*solvedSheet, error) {
	access, err := s.opened(r)
	if err != nil {
		return nil, err
	}
	return s.solved(r.Context(), access.Sheet, access.Revision)
}

// name tells the browser under which name to keep a file: the number of the sheet, or its title, and an ending.
func name(w http.ResponseWriter, disposition string, sheet *schematic.Sheet, ending string) {
	stem := strings.TrimSpace(sheet.Number)
	if stem == "" {
		stem = strings.TrimSpace(sheet.Title)
	}
	stem = strings.Map(func(r rune) rune {
		if r < ' ' || strings.ContainsRune(`/\:*?"<>|`, r) {
			return '-'
		}
		return r
	}, stem)
	if stem = strings.TrimLeft(stem, ". "); stem == "" {
		stem = "sheet"
	}
	w.Header().Set("Content-Disposition", mime.FormatMediaType(disposition, map[string]string{"filename": stem + ending}))
}
