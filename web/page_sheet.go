package web

import (
	"context"
	"encoding/json"
	"net/http"
	"net/url"
	"strconv"

	"github.com/go-json-experiment/json/jsontext"
	"github.com/google/uuid"

	"loopwright/schematic/draw"
	"loopwright/web/store"
	"loopwright/web/view"
)

// showSheetPage answers GET /s/{key}, in the case that the query names.
func (s *Server) showSheetPage(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	solved, err := s.solved(r.Context(), access.Sheet, access.Revision)
	if err != nil {
		return err
	}
	shown := solved.caseNamed(r.URL.Query().Get("case"))
	sheet := s.sheetView(solved, access, shown)
	sheet.Key = parameter(r, "key")
	sheet.Author = uuid.NewString()
	sheet.Drawing = string(s.compose(solved, shown).AppendSVG(nil))
	if sheet.Editable() {
		sheet.Tray = view.BuildTray(solved.Sheet.System, solved.Sheet.Symbols)
	}
	return sendPage(w, r, http.StatusOK, view.SheetPage(sheet))
}

// caseNamed gives the index of a case, or that of the first when there is none of the name.
func (s *solvedSheet) caseNamed(name string) int { return max(0, s.Sheet.Case(name)) }

// sheetView is what a page says of a sheet in a case, but for the drawing.
func (s *Server) sheetView(solved *solvedSheet, access store.Access, shown int) *view.Sheet {
	title := solved.Sheet.Title
	if title == "" {
		title = "Untitled"
	}
	return &view.Sheet{
		Page: pageOf(title + " · Loopwright"), Role: view.Role(access.Role), Revision: solved.Revision,
		Size: solved.Sheet.Size, Number: solved.Sheet.Number, Heading: title, Owner: solved.Sheet.Owner, Set: string(solved.Sheet.Symbols),
		Case: solved.Result.Cases[shown].Name, Strip: view.BuildStrip(solved.Sheet, solved.Result, shown),
		Margin: view.BuildMargin(solved.Sheet, solved.Result, shown), Printed: s.today(), Keys: view.Keys(access.Role == store.Edit),
	}
}

func (s *Server) today() string { return s.now().UTC().Format("2006-01-02") }

func (s *Server) compose(solved *solvedSheet, shown int) *draw.Picture {
	return draw.Compose(solved.Sheet, solved.Result, draw.Options{
		Case: shown, Meshes: true, Interactive: true, Date: s.today(),
	})
}

// frameKey names what a page shows.
type frameKey struct {
	sheet    store.ID
	revision int
	shown    string
	role     store.Role
	day      string
}

// mostFrames bounds what is remembered of frames, in bytes.
const mostFrames = 64 << 20

// frame gives what a page shows of a sheet at a revision in a case.
func (s *Server) frame(ctx context.Context, access store.Access, revision int, shownCase string) (*frame, error) {
	key := frameKey{access.Sheet, revision, shownCase, access.Role, s.today()}
	if known, ok := s.frames.Get(key); ok {
		return known, nil
	}
	solved, err := s.solved(ctx, access.Sheet, revision)
	if err != nil {
		return nil, err
	}
	shown := solved.caseNamed(shownCase)
	made, err := newFrame(ctx, s.compose(solved, shown), s.sheetView(solved, access, shown))
	if err != nil {
		return nil, err
	}
	s.frames.Put(key, made, made.size())
	return made, nil
}

// editFromPage answers POST /s/{key}/edit: applies a batch and answers, once it is durable, with the patch from what
// the page shows. What was made stands in the header Loopwright-Made, as escaped JSON.
func (s *Server) editFromPage(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r, store.Edit)
	if err != nil {
		return err
	}
	if err := readForm(r); err != nil {
		return err
	}
	base, _ := strconv.Atoi(r.PostForm.Get("base")) // a page that has lost count is sent everything
	answer, err := s.commit(r.Context(), access, sentBatch{
		ID: r.PostForm.Get("id"), Base: base, Author: r.PostForm.Get("author"), Edits: jsontext.Value(r.PostForm.Get("edits")),
	})
	if err != nil {
		return err
	}
	made, err := json.Marshal(answer.Made)
	if err != nil {
		return err
	}
	w.Header().Set("Loopwright-Made", url.PathEscape(string(made)))
	access.Revision = max(access.Revision, answer.Revision)
	shown := r.PostForm.Get("case")
	return s.sendPatch(w, r, access, base, shown, shown)
}

// showChanges answers GET /s/{key}/changes: the patch from what the page shows, at revision `since` in case `was`, to
// the newest revision in case `case`.
func (s *Server) showChanges(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	query := r.URL.Query()
	since, _ := strconv.Atoi(query.Get("since"))
	return s.sendPatch(w, r, access, since, query.Get("was"), query.Get("case"))
}

func (s *Server) sendPatch(w http.ResponseWriter, r *http.Request, access store.Access, since int, was, shown string) error {
	now, err := s.frame(r.Context(), access, access.Revision, shown)
	if err != nil {
		return err
	}
	var before *frame
	if since > 0 && since <= access.Revision {
		// Without the frame before, the page is sent everything, which is never wrong.
		before, _ = s.frame(r.Context(), access, since, was)
	}
	sendHTML(w, http.StatusOK, now.patch(before))
	return nil
}

// showCard answers GET /s/{key}/card: the card of one part (`ref`) or one wire (`wire`) in one case.
func (s *Server) showCard(w http.ResponseWriter, r *http.Request) error {
	access, err := s.opened(r)
	if err != nil {
		return err
	}
	solved, err := s.solved(r.Context(), access.Sheet, access.Revision)
	if err != nil {
		return err
	}
	query := r.URL.Query()
	shown := solved.caseNamed(query.Get("case"))
	part, wire := solved.Sheet.Part(query.Get("ref")), solved.Sheet.Wire(query.Get("wire"))
	var card view.Card
	switch {
	case part != nil:
		card = view.BuildCard(solved.Sheet, solved.Result, shown, part)
	case wire != nil:
		card = view.BuildWireCard(solved.Sheet, solved.Result, shown, wire)
	default:
		return &problem{status: http.StatusNotFound, message: "There is no such part on the sheet any more."}
	}
	card.Editable = access.Role == store.Edit
	return sendPage(w, r, http.StatusOK, view.PartCard(&card))
}
