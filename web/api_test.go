package web

import (
	"encoding/json"
	"fmt"
	"net/http"
	"reflect"
	"strings"
	"testing"

	"github.com/go-chi/chi/v5"
	"github.com/google/uuid"
)

// number makes a UUID of a number.
func number(n int) string { return uuid.NewSHA1(uuid.NameSpaceOID, fmt.Append(nil, n)).String() }

// edits makes the body of a batch.
func edits(n int, author string, list ...string) string {
	batch := map[string]any{"id": number(n), "base": 1, "edits": json.RawMessage("[" + strings.Join(list, ",") + "]")}
	if author != "" {
		batch["author"] = author
	}
	body, err := json.Marshal(batch)
	if err != nil {
		panic(err)
	}
	return string(body)
}

const (
	addResistor = `{"do": "add", "part": {"kind": "resistor", "at": [20, 10]}}`
	rename      = `{"do": "rename", "ref": "P1", "to": "P7"}`
	undo, redo  = `{"do": "undo"}`, `{"do": "redo"}`
)

func TestWhatTheInterfaceForProgramsAnswers(t *testing.T) {
	s := run(t)
	edit := s.create(lamp)
	review, view := s.share(edit, "review", "Colleague"), s.share(edit, "view", "Bench 3")
	gone := s.share(edit, "view", "Gone")
	s.want(204, "DELETE", "/api/v1/sheets/"+edit+"/keys/Gone", "")
	at := func(key, rest string) string { return "/api/v1/sheets/" + key + rest }
	big := `{"format": "loopwright-sheet/1", "title": "` + strings.Repeat("x", mostBody) + `"}`
	for _, c := range []struct {
		name, method, path, body string
		status                   int
		place                    string
	}{
		{"solving a sheet", "POST", "/api/v1/solve", lamp, 200, ""},
		{"solving what is no JSON", "POST", "/api/v1/solve", "24 volts", 400, "line 1"},
		{"solving nothing", "POST", "/api/v1/solve", "", 400, "line 1"},
		{"solving JSON that is cut off", "POST", "/api/v1/solve", lamp[:200], 400, "line 5"},
		{"solving what is not UTF-8", "POST", "/api/v1/solve", "\"\xff\"", 400, ""},
		{"solving a sheet with a byte order mark", "POST", "/api/v1/solve", "\ufeff" + lamp, 400, ""},
		{"solving two sheets", "POST", "/api/v1/solve", lamp + lamp, 400, "line 13"},
		{"solving a list", "POST", "/api/v1/solve", "[]", 422, ""},
		{"solving an unknown kind", "POST", "/api/v1/solve", strings.Replace(lamp, `"lamp"`, `"flux"`, 1), 422, "parts[2].kind"},
		{"solving with a field given twice", "POST", "/api/v1/solve", strings.Replace(lamp, `"number"`, `"title"`, 1), 422, "title"},
		{"solving more than 4 MiB", "POST", "/api/v1/solve", big, 413, ""},
		{"getting a solution of nothing", "GET", "/api/v1/solve", "", 405, ""},

		{"storing a sheet", "POST", "/api/v1/sheets", lamp, 201, ""},
		{"storing what is no JSON", "POST", "/api/v1/sheets", "{", 400, "line 1"},
		{"storing what is no sheet", "POST", "/api/v1/sheets", `{"format": "loopwright-sheet/2"}`, 422, "system"},
		{"storing more than 4 MiB", "POST", "/api/v1/sheets", big, 413, ""},
		{"storing 5,001 parts", "POST", "/api/v1/sheets", terminals(5001), 422, "parts"},

		{"reading with the edit key", "GET", at(edit, ""), "", 200, ""},
		{"reading with a review key", "GET", at(review, ""), "", 200, ""},
		{"reading with a view key", "GET", at(view, ""), "", 200, ""},
		{"reading with a wrong key", "GET", at("0123456789abcdefghjkmnpqrstvwxyz", ""), "", 404, ""},
		{"reading with a withdrawn key", "GET", at(gone, ""), "", 404, ""},
		{"solution with a view key", "GET", at(view, "/solution"), "", 200, ""},
		{"solution with a withdrawn key", "GET", at(gone, "/solution"), "", 404, ""},

		{"editing with a view key", "POST", at(view, "/edits"), edits(1, "", addResistor), 403, ""},
		{"editing with a review key", "POST", at(review, "/edits"), edits(1, "", addResistor), 403, ""},
		{"editing with a withdrawn key", "POST", at(gone, "/edits"), edits(1, "", addResistor), 404, ""},
		{"editing with what is no JSON", "POST", at(edit, "/edits"), `{"id": `, 400, "line 1"},
		{"editing with a list", "POST", at(edit, "/edits"), "[" + addResistor + "]", 422, ""},
		{"editing without an id", "POST", at(edit, "/edits"), `{"base": 1, "edits": [` + undo + `]}`, 422, "id"},
		{"editing with a number for an id", "POST", at(edit, "/edits"), `{"id": 7, "base": 1, "edits": [` + undo + `]}`, 422, "id"},
		{"editing with an author who is no UUID", "POST", at(edit, "/edits"), edits(1, "me", undo), 422, "author"},
		{"editing on half a revision", "POST", at(edit, "/edits"), strings.Replace(edits(1, "", undo), `"base":1`, `"base":1.5`, 1), 422, "base"},
		{"editing on a negative revision", "POST", at(edit, "/edits"), strings.Replace(edits(1, "", undo), `"base":1`, `"base":-1`, 1), 422, "base"},
		{"editing on a revision to come", "POST", at(edit, "/edits"), strings.Replace(edits(1, "", addResistor), `"base":1`, `"base":99`, 1), 409, ""},
		{"editing with an unknown field", "POST", at(edit, "/edits"), strings.Replace(edits(1, "", undo), `"base"`, `"bass"`, 1), 422, "bass"},
		{"editing with a field given twice", "POST", at(edit, "/edits"), strings.Replace(edits(1, "", undo), `"do"`, `"do":"redo","do"`, 1), 422, "edits[0].do"},
		{"editing without edits", "POST", at(edit, "/edits"), edits(1, ""), 422, "edits"},
		{"editing with no list", "POST", at(edit, "/edits"), `{"id": "` + number(1) + `", "base": 1}`, 422, "edits"},
		{"an unknown edit", "POST", at(edit, "/edits"), edits(1, "", `{"do": "paint"}`), 422, "edits[0].do"},
		{"an edit of an unknown kind", "POST", at(edit, "/edits"),
			edits(1, "", addResistor, strings.Replace(addResistor, "resistor", "flux", 1)), 422, "edits[1].part.kind"},
		{"an edit after an undo", "POST", at(edit, "/edits"),
			edits(1, "", addResistor, undo, `{"do": "set", "ref": "P1", "values": {"power": "-2 W"}}`), 422, "edits[2].values.power"},
		{"an edit of a part that is not there", "POST", at(edit, "/edits"), edits(1, "", addResistor, `{"do": "remove", "refs": ["K9"]}`), 409, ""},
		{"a reference that is taken", "POST", at(edit, "/edits"), edits(1, "", `{"do": "rename", "ref": "P1", "to": "S1"}`), 409, ""},
		{"an undo of nothing", "POST", at(edit, "/edits"), edits(1, "", undo), 409, ""},
		{"an edit of more than 4 MiB", "POST", at(edit, "/edits"), edits(1, "", `{"do": "`+strings.Repeat("x", mostBody)+`"}`), 413, ""},

		{"a key by a view key", "POST", at(view, "/keys"), `{"role": "view", "name": "Other"}`, 403, ""},
		{"a key by a withdrawn key", "POST", at(gone, "/keys"), `{"role": "view", "name": "Other"}`, 404, ""},
		{"a key of a name in use", "POST", at(edit, "/keys"), `{"role": "view", "name": "Colleague"}`, 409, ""},
		{"a key to edit", "POST", at(edit, "/keys"), `{"role": "edit", "name": "Other"}`, 422, "role"},
		{"a key without a name", "POST", at(edit, "/keys"), `{"role": "view"}`, 422, "name"},
		{"a key that expires some day", "POST", at(edit, "/keys"), `{"role": "view", "name": "Other", "expires": "some day"}`, 422, "expires"},
		{"a key that has expired", "POST", at(edit, "/keys"), `{"role": "view", "name": "Other", "expires": "2001-01-01T00:00:00Z"}`, 422, "expires"},
		{"a key that expires in time", "POST", at(edit, "/keys"), `{"role": "view", "name": "Until 2999", "expires": "2999-01-01T00:00:00Z"}`, 201, ""},
		{"a key with an unknown field", "POST", at(edit, "/keys"), `{"role": "view", "name": "Other", "until": 7}`, 422, "until"},
		{"withdrawing by a view key", "DELETE", at(view, "/keys/Colleague"), "", 403, ""},
		{"withdrawing what is not there", "DELETE", at(edit, "/keys/Nobody"), "", 404, ""},
		{"events with a withdrawn key", "GET", at(gone, "/events"), "", 404, ""},

		{"an unknown address", "GET", "/api/v1/cables", "", 404, ""},
		{"putting a sheet", "PUT", at(edit, ""), lamp, 405, ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := s.send(c.method, c.path, c.body)
			if got.status != c.status {
				t.Fatalf("status %d, want %d: %s", got.status, c.status, got.body)
			}
			if got.status < 400 {
				return
			}
			var refused struct {
				Error struct{ Message, Place string }
			}
			if err := json.Unmarshal([]byte(got.body), &refused); err != nil {
				t.Fatalf("the answer is not JSON: %s", got.body)
			}
			if refused.Error.Message == "" || refused.Error.Place != c.place {
				t.Errorf("the answer is %s, want a sentence and the place %q", got.body, c.place)
			}
		})
	}
	after := s.want(200, "GET", at(edit, ""), "")
	if after["revision"] != 1.0 {
		t.Errorf("after all that is refused, the sheet is at revision %v, want 1", after["revision"])
	}
}

// terminals is a sheet of many terminals.
func terminals(count int) string {
	parts := make([]string, count)
	for i := range parts {
		parts[i] = fmt.Sprintf(`{"ref": "X%d", "kind": "terminal", "at": [%d, %d]}`, i, 2*(i%100), 2*(i/100))
	}
	return `{"format": "loopwright-sheet/1", "system": {"kind": "dc"}, "parts": [` + strings.Join(parts, ",") + `]}`
}

func TestASheetIsStoredEditedSolvedAndTakenAway(t *testing.T) {
	s := run(t)
	created := s.want(201, "POST", "/api/v1/sheets", lamp)
	if created["revision"] != 1.0 || len(created) != 2 {
		t.Errorf("creating answers %v, want an edit key and revision 1", created)
	}
	key := created["edit_key"].(string)
	edited := s.want(200, "POST", "/api/v1/sheets/"+key+"/edits", edits(1, "", rename, addResistor))
	made := map[string]any{"refs": []any{"R1"}, "wires": []any{}, "joined": []any{}}
	if edited["revision"] != 2.0 || !reflect.DeepEqual(edited["made"], made) {
		t.Errorf("the edit answers %v, want revision 2 and %v", edited, made)
	}
	shown := s.want(200, "GET", "/api/v1/sheets/"+key, "")
	if shown["role"] != "edit" || shown["revision"] != 2.0 {
		t.Errorf("the sheet is shown as %v at revision %v", shown["role"], shown["revision"])
	}
	file := s.send("GET", "/s/"+key+"/sheet.json", "")
	var sheet any
	if err := json.Unmarshal([]byte(file.body), &sheet); err != nil || !reflect.DeepEqual(sheet, shown["sheet"]) {
		t.Errorf("the file holds another sheet than the interface shows: %v", err)
	}
	if got := file.header.Get("Content-Disposition"); got != "attachment; filename=HL-0001.sheet.json" {
		t.Errorf("the file is offered as %s", got)
	}
	stored := s.want(200, "GET", "/api/v1/sheets/"+key+"/solution", "")
	direct := s.want(200, "POST", "/api/v1/solve", file.body)
	delete(stored, "timing")
	delete(direct, "timing")
	if !reflect.DeepEqual(stored, direct) {
		t.Errorf("the stored sheet is solved otherwise than its file:\n%v\n%v", stored, direct)
	}
	// U = 24 V across the closed contact and the lamp; the lamp has R = U²/P (rated 24 V, 2 W).
	for _, c := range stored["cases"].([]any) {
		c := c.(map[string]any)
		if c["name"] != "Light on" {
			continue
		}
		for _, part := range c["parts"].([]any) {
			if part := part.(map[string]any); part["ref"] == "P7" {
				volts := part["voltage"].(map[string]any)["re"].(float64)
				if want := 24 * 288 / 288.02; volts < want-1e-6 || volts > want+1e-6 {
					t.Errorf("the lamp gets %v V, want %v V", volts, want)
				}
			}
		}
	}
}

func TestAnEditSentTwiceIsAppliedOnce(t *testing.T) {
	s := run(t)
	path := "/api/v1/sheets/" + s.create(lamp) + "/edits"
	first := s.send("POST", path, edits(1, "", addResistor))
	s.want(200, "POST", path, edits(2, "", rename))
	again := s.send("POST", path, edits(1, "", addResistor))
	if first.status != 200 || again.status != 200 || first.body != again.body {
		t.Errorf("the answers are %v and %v, want the same", first, again)
	}
	if other := s.send("POST", path, edits(1, "", undo)); other.body != first.body {
		t.Errorf("other edits under the same id are answered %s", other.body)
	}
}

func TestAConflictTellsTheNewestRevision(t *testing.T) {
	s := run(t)
	path := "/api/v1/sheets/" + s.create(lamp) + "/edits"
	s.want(200, "POST", path, edits(1, "", rename))
	got := s.want(409, "POST", path, edits(2, "", rename))
	if got["revision"] != 2.0 {
		t.Errorf("the conflict answers %v, want revision 2", got)
	}
}

func TestTwoAuthorsUndoTheirOwn(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	ann, ben := number(-1), number(-2)
	for i, step := range []struct {
		author, edit string
		status       int
		title, ref   string
	}{
		{ann, `{"do": "sheet", "set": {"title": "By Ann"}}`, 200, "By Ann", "P1"},
		{ben, rename, 200, "By Ann", "P7"},
		{ann, undo, 200, "Lamp in the pump house", "P7"},
		{ann, undo, 409, "Lamp in the pump house", "P7"},
		{"", undo, 409, "Lamp in the pump house", "P7"},
		{ben, undo, 200, "Lamp in the pump house", "P1"},
		{ann, redo, 200, "By Ann", "P1"},
		{strings.ToUpper(ben), redo, 200, "By Ann", "P7"},
		{"", `{"do": "rename", "ref": "P7", "to": "P8"}`, 200, "By Ann", "P8"},
		{ben, undo, 409, "By Ann", "P8"},
		{"", undo, 200, "By Ann", "P7"},
	} {
		s.want(step.status, "POST", "/api/v1/sheets/"+key+"/edits", edits(i, step.author, step.edit))
		sheet := s.want(200, "GET", "/api/v1/sheets/"+key, "")["sheet"].(map[string]any)
		ref := sheet["parts"].([]any)[2].(map[string]any)["ref"]
		if sheet["title"] != step.title || ref != step.ref {
			t.Fatalf("step %d: the sheet is %q with lamp %v, want %q with lamp %s", i, sheet["title"], ref, step.title, step.ref)
		}
	}
}

func TestNamesOfKeysMayHoldAnything(t *testing.T) {
	s := run(t)
	edit := s.create(lamp)
	for _, c := range []struct{ name, path string }{
		{"Bench 3", "Bench%203"}, {"50 % / 100 %", "50%20%25%20%2F%20100%20%25"}, {"Prüfstand", "Pr%C3%BCfstand"}, {"a+b?c#d", "a+b%3Fc%23d"},
	} {
		key := s.share(edit, "view", c.name)
		s.want(204, "DELETE", "/api/v1/sheets/"+edit+"/keys/"+c.path, "")
		s.want(404, "GET", "/api/v1/sheets/"+key, "")
	}
}

func TestEveryAnswerCarriesTheHeadersOfSafety(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	check := func(method, path string) {
		got := s.send(method, path, "")
		want := map[string]string{
			"X-Content-Type-Options": "nosniff", "Referrer-Policy": "same-origin",
		}
		if strings.HasPrefix(path, "/s/") || strings.HasPrefix(path, "/api/") {
			want["Cache-Control"], want["X-Robots-Tag"] = "no-store", "noindex"
		}
		for name, value := range want {
			if got.header.Get(name) != value {
				t.Errorf("%s %s answers %d with %s %q, want %q", method, path, got.status, name, got.header.Get(name), value)
			}
		}
		policy := got.header.Get("Content-Security-Policy")
		for _, rule := range []string{"default-src 'self'", "object-src 'none'", "base-uri 'none'", "frame-ancestors 'none'", "form-action 'self'"} {
			if !strings.Contains(policy, rule) {
				t.Errorf("%s %s answers with a policy without %s", method, path, rule)
			}
		}
		if strings.Contains(policy, "unsafe") {
			t.Errorf("%s %s answers with the policy %s", method, path, policy)
		}
	}
	routes := 0
	err := chi.Walk(s.server.router.(chi.Routes), func(method, pattern string, _ http.Handler, _ ...func(http.Handler) http.Handler) error {
		if strings.HasSuffix(pattern, "/events") || !strings.Contains("GET POST PUT DELETE", method) {
			return nil // a stream does not end; its headers are checked with the events
		}
		routes++
		path := strings.NewReplacer("{name}", "Nobody", "*", "x").Replace(pattern)
		check(method, strings.ReplaceAll(path, "{key}", key))
		check(method, strings.ReplaceAll(path, "{key}", "wrong"))
		return nil
	})
	if err != nil || routes < 12 {
		t.Errorf("%d routes were walked: %v", routes, err)
	}
	check("GET", "/nowhere")
	check("PUT", "/s/"+key+"/sheet.json")
}

func TestWhatAnotherSiteAsksABrowserToSendIsRefused(t *testing.T) {
	s := run(t)
	key := s.create(lamp)
	path := "/api/v1/sheets/" + key + "/edits"
	for _, c := range []struct {
		name    string
		headers []string
		status  int
	}{
		{"another site", []string{"Sec-Fetch-Site", "cross-site"}, 403},
		{"another port", []string{"Sec-Fetch-Site", "same-site"}, 403},
		{"an old browser on another site", []string{"Origin", "https://elsewhere.example"}, 403},
		{"a page without an origin", []string{"Origin", "null"}, 403},
		{"our own page", []string{"Sec-Fetch-Site", "same-origin", "Origin", s.http.URL}, 200},
		{"a program", nil, 200},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := s.send("POST", path, edits(1, "", addResistor), c.headers...); got.status != c.status {
				t.Errorf("status %d, want %d: %s", got.status, c.status, got.body)
			}
		})
	}
}

func TestWhatPeopleTypeStaysText(t *testing.T) {
	const hostile = `</script><img src=x onerror=alert(1)>&"'` + "\u2028"
	s := run(t)
	quoted, err := json.Marshal(hostile)
	if err != nil {
		t.Fatal(err)
	}
	key := s.create(strings.Replace(lamp, `"Lamp in the pump house"`, string(quoted), 1))
	for _, path := range []string{"/api/v1/sheets/" + key, "/s/" + key + "/sheet.json"} {
		got := s.send("GET", path, "")
		if kind := got.header.Get("Content-Type"); kind != "application/json" {
			t.Errorf("%s is sent as %s", path, kind)
		}
		var value map[string]any
		if err := json.Unmarshal([]byte(got.body), &value); err != nil {
			t.Fatalf("%s: %v", path, err)
		}
		if sheet, ok := value["sheet"].(map[string]any); ok {
			value = sheet
		}
		if value["title"] != hostile {
			t.Errorf("%s gives the title back as %q", path, value["title"])
		}
	}
	got := s.send("GET", "/s/"+key+"/drawing.svg", "")
	if got.status != 200 || strings.Contains(got.body, "<img") || strings.Contains(got.body, "</script") {
		t.Errorf("the drawing holds what was typed as markup: %d", got.status)
	}
}
