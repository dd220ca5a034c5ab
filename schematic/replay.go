package schematic

import (
	"cmp"
	"slices"
)

// Replay makes a change again, on the sheet that it was made on or on a later one. It is a *ConflictError when
// something that the change touches is not as it was before the change.
func Replay(sheet *Sheet, change *Change) (*Sheet, error) {
	after := *sheet
	var err error
	if after.Parts, err = replayList(sheet.Parts, change.Parts, namedParts, "part -"); err != nil {
		return nil, err
	}
	if after.Wires, err = replayList(sheet.Wires, change.Wires, namedWires, "wire "); err != nil {
		return nil, err
	}
	if after.Cases, err = replayList(sheet.Cases, change.Cases, namedCases, "case "); err != nil {
		return nil, err
	}
	if err := replayHead(&after, change.Head); err != nil {
		return nil, err
	}
	if err := replayJoints(&after, change.Joints); err != nil {
		return nil, err
	}
	if err := replayOrder(&after, change.Order); err != nil {
		return nil, err
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
	gone := map[int]bool{}
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
			gone[i] = true
			continue
		}
		item, err := readText(t.After, how.read)
		if err != nil {
			return nil, err
		}
		list[i] = item
	}
	return insertAll(removeAll(list, gone), added, how)
}

func removeAll[T any](list []T, gone map[int]bool) []T {
	kept := list[:0]
	for i, item := range list {
		if !gone[i] {
			kept = append(kept, item)
		}
	}
	return kept
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

func replayHead(sheet *Sheet, head *Touched) error {
	if head == nil {
		return nil
	}
	if string(appendHeadObject(sheet)) != head.Before {
		return conflict("the title block or the settings have changed since")
	}
	tree, err := parse([]byte(head.After))
	if err != nil {
		return err
	}
	sheet.Title, sheet.Number, sheet.Owner, sheet.Author, sheet.Reference = "", "", "", "", ""
	return readFields(tree, "", "the sheet", headReaders(sheet))
}

func replayJoints(sheet *Sheet, joints *Touched) error {
	if joints == nil {
		return nil
	}
	if string(appendPoints(nil, sheet.Joints)) != joints.Before {
		return conflict("the joints have changed since")
	}
	points, err := readText(joints.After, func(value any, place string) (points []Point, err error) {
		err = intoPoints(&points)(value, place)
		return points, err
	})
	sheet.Joints = points
	return err
}

func replayOrder(sheet *Sheet, order *Touched) error {
	if order == nil {
		return nil
	}
	names, err := readText(order.After, func(value any, place string) (names []string, err error) {
		err = intoTexts(&names)(value, place)
		return names, err
	})
	if err != nil {
		return err
	}
	sheet.Cases = slices.Clone(sheet.Cases)
	slices.SortStableFunc(sheet.Cases, func(a, b Case) int {
		return cmp.Compare(slices.Index(names, a.Name), slices.Index(names, b.Name))
	})
	return nil
}
