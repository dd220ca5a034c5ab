package schematic

import (
	"cmp"
	"slices"
)

// Replay makes a change again, on the sheet that it was made on or on a later one. It is a *ConflictError when
// something that the change touches is not as it was before the change. The sheet that it is given stays as it is.
func Replay(sheet *Sheet, change *Change) (*Sheet, error) {
	after := *sheet
	var failed [5]error
	after.Parts, failed[0] = replayList(sheet.Parts, change.Parts, namedParts, "part -")
	after.Wires, failed[1] = replayList(sheet.Wires, change.Wires, namedWires, "wire ")
	after.Joints, failed[2] = replayList(sheet.Joints, change.Joints, namedJoints, "joint at ")
	after.Cases, failed[3] = replayList(sheet.Cases, change.Cases, namedCases, "case ")
	failed[4] = replayHead(&after, change.Head)
	for _, err := range failed {
		if err != nil {
			return nil, err
		}
	}
	if err := Validate(&after); err != nil {
		return nil, conflict("the sheet has changed since, so that this no longer fits: %v", err)
	}
	return &after, nil
}

func replayList[T any](items []T, touched []Touched, how named[T], what string) ([]T, error) {
	if len(touched) == 0 {
		return items, nil
	}
	list := slices.Clone(items)
	at := make(map[string]int, len(list))
	for i := range list {
		at[how.name(&list[i])] = i
	}
	var gone []int
	var added []Touched
	for _, t := range touched {
		i, present := at[t.Name]
		switch {
		case t.Before == "" && present:
			return nil, conflict("there is a %s%s already", what, t.Name)
		case t.Before == "":
			added = append(added, t)
			continue
		case !present:
			return nil, conflict("%s%s is gone", what, t.Name)
		case string(how.text(nil, &list[i])) != t.Before:
			return nil, conflict("%s%s has changed since", what, t.Name)
		case t.After == "":
			gone = append(gone, i)
			continue
		case t.Moved:
			gone = append(gone, i)
			added = append(added, t)
			continue
		}
		item, err := readText(t.After, how.read)
		if err != nil {
			return nil, err
		}
		list[i] = item
	}
	slices.Sort(gone)
	return insertAll(leaveOut(list, gone), added, how)
}

func insertAll[T any](list []T, added []Touched, how named[T]) ([]T, error) {
	slices.SortFunc(added, func(a, b Touched) int { return cmp.Compare(a.To, b.To) })
	for _, t := range added {
		item, err := readText(t.After, how.read)
		if err != nil {
			return nil, err
		}
		list = slices.Insert(list, min(max(t.To, 0), len(list)), item)
	}
	return list, nil
}

// readText reads one thing as it is written in a sheet file.
func readText[T any](text string, read func(any, string) (T, error)) (T, error) {
	tree, err := parse([]byte(text))
	if err != nil {
		var none T
		return none, err
	}
	return read(tree, "")
}

func replayHead(sheet *Sheet, touched []Touched) error {
	fields := headReaders(sheet)
	for _, t := range touched {
		read, known := fields[t.Name]
		switch {
		case !known:
			return conflict("this version knows no field %q of a sheet", t.Name)
		case string(headField(sheet, t.Name)) != t.Before:
			return conflict("the field %q of the sheet has changed since", t.Name)
		}
		text := t.After
		if text == "" {
			text = `""`
		}
		tree, err := parse([]byte(text))
		if err != nil {
			return err
		}
		if err := read(tree, t.Name); err != nil {
			return err
		}
	}
	return nil
}
