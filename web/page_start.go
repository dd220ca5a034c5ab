package web

import (
	"net/http"
	"path"
	"slices"
	"strings"

	"loopwright/schematic"
	"loopwright/testdata"
	"loopwright/web/view"
)

// examples says in a line what each demo sheet shows, in the order of the start page.
var examples = []struct{ name, says string }{
	{"pump-lamp", "A supply, a fuse, a selector and a lamp: one mesh, two cases."},
	{"two-supplies", "Two supplies share a load: who carries how much of it."},
	{"sensor-bridge", "A bridge out of balance, and what its meter shows."},
}

// showStart answers GET /.
func (s *Server) showStart(w http.ResponseWriter, r *http.Request) error {
	start, err := startPage("")
	if err != nil {
		return err
	}
	return sendPage(w, r, http.StatusOK, view.StartPage(start))
}

func startPage(trouble string) (*view.Start, error) {
	start := &view.Start{Page: pageOf("Loopwright"), Error: trouble}
	for _, example := range examples {
		sheet, err := readExample(example.name)
		if err != nil {
			return nil, err
		}
		start.Examples = append(start.Examples, view.Example{Name: example.name, Number: sheet.Number, Title: sheet.Title, Says: example.says})
	}
	return start, nil
}

func readExample(name string) (*schematic.Sheet, error) {
	data, err := testdata.Demo.ReadFile(path.Join("demo", name+".sheet.json"))
	if err != nil {
		return nil, err
	}
	return schematic.Decode(data)
}

// createFromPage answers POST /new: makes an empty sheet, or a copy of an example, and leads to it.
func (s *Server) createFromPage(w http.ResponseWriter, r *http.Request) error {
	if err := readForm(r); err != nil {
		return err
	}
	sheet, err := sheetFromForm(r)
	if err != nil {
		return err
	}
	if err := schematic.Validate(sheet); err != nil {
		start, pageErr := startPage(err.Error())
		if pageErr != nil {
			return pageErr
		}
		return sendPage(w, r, http.StatusUnprocessableEntity, view.StartPage(start))
	}
	_, key, _, err := s.store.Create(r.Context(), sheet)
	if err != nil {
		return err
	}
	http.Redirect(w, r, "/s/"+key, http.StatusSeeOther)
	return nil
}

func sheetFromForm(r *http.Request) (*schematic.Sheet, error) {
	if name := r.PostForm.Get("example"); name != "" {
		if !slices.ContainsFunc(examples, func(e struct{ name, says string }) bool { return e.name == name }) {
			return nil, &problem{status: http.StatusNotFound, message: "There is no example of that name; choose one of the start page."}
		}
		return readExample(name)
	}
	title := strings.TrimSpace(r.PostForm.Get("title"))
	if title == "" {
		title = "Untitled"
	}
	sheet := schematic.New(title)
	sheet.Reference = "0V"
	if size := r.PostForm.Get("size"); size != "" {
		sheet.Size = size
	}
	return sheet, nil
}
