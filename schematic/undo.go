package schematic

import "slices"

// Entry is one line of a sheet's log: what an author did, and what that changed.
type Entry struct {
	Revision int
	Author   string
	Do       string // "edit", "undo" or "redo"
	Of       int    // for undo and redo: the revision of the edit that is taken back or made again
	Change   *Change
}

// Undo takes back the author's last edit that is not taken back yet, and gives the new sheet, the change, and the
// revision of that edit. It is a *ConflictError when there is none, or when something that the edit touched has been
// changed since. The log may begin anywhere; what is older cannot be taken back.
func Undo(sheet *Sheet, log []Entry, author string) (*Sheet, *Change, int, error) {
	done, _ := history(log, author)
	if len(done) == 0 {
		return nil, nil, 0, conflict("there is nothing of yours left to undo")
	}
	return again(sheet, log, done[len(done)-1], (*Change).Inverse)
}

// Redo makes the author's last undone edit again, unless the author has made another edit since. Results and errors are
// those of Undo.
func Redo(sheet *Sheet, log []Entry, author string) (*Sheet, *Change, int, error) {
	_, undone := history(log, author)
	if len(undone) == 0 {
		return nil, nil, 0, conflict("there is nothing of yours to redo")
	}
	return again(sheet, log, undone[len(undone)-1], func(c *Change) *Change { return c })
}

// history tells which of an author's edits stand, and which are undone and can be made again, latest last.
func history(log []Entry, author string) (done, undone []int) {
	for _, entry := range log {
		if entry.Author != author {
			continue
		}
		switch entry.Do {
		case "undo":
			if i := slices.Index(done, entry.Of); i >= 0 {
				done = slices.Delete(done, i, i+1)
				undone = append(undone, entry.Of)
			}
		case "redo":
			if i := slices.Index(undone, entry.Of); i >= 0 {
				undone = slices.Delete(undone, i, i+1)
				done = append(done, entry.Of)
			}
		default:
			done, undone = append(done, entry.Revision), nil
		}
	}
	return done, undone
}

func again(sheet *Sheet, log []Entry, revision int, turn func(*Change) *Change) (*Sheet, *Change, int, error) {
	i := slices.IndexFunc(log, func(entry Entry) bool { return entry.Revision == revision })
	change := turn(log[i].Change)
	after, err := Replay(sheet, change)
	return after, change, revision, err
}
