package schematic

import "strconv"

// under is the place of a field, or of what has a place of its own in something: "values" and "resistance", "points" and
// "[2]".
func under(place, key string) string {
	if place == "" || key == "" || key[0] == '[' {
		return place + key
	}
	return place + "." + key
}

// at is the place of an item of a list.
func at(place string, index int) string { return place + "[" + strconv.Itoa(index) + "]" }

// reader takes one value from what parse gives, and knows the place of the value for what it has to refuse.
type reader func(value any, place string) error

// readers says how each field of an object is read.
type readers map[string]reader

// readFields takes an object apart; fields without a reader and null are refused.
func readFields(value any, place, what string, fields readers) error {
	members, ok := value.(object)
	if !ok {
		return refuse(place, "write %s as an object in braces", what)
	}
	for _, m := range members {
		read, known := fields[m.key]
		here := under(place, m.key)
		if !known {
			return refuse(here, "%s has no field of this name; leave it out", what)
		}
		if m.value == nil {
			return refuse(here, "null is no value; leave the field out")
		}
		if err := read(m.value, here); err != nil {
			return err
		}
	}
	return nil
}

// has reports whether an object has a field.
func has(value any, key string) bool {
	members, _ := value.(object)
	for i := range members {
		if members[i].key == key {
			return true
		}
	}
	return false
}

// list reads each item of an array.
func list(value any, place string, each reader) error {
	items, ok := value.([]any)
	if !ok {
		return refuse(place, "write a list in square brackets")
	}
	for i, item := range items {
		if err := each(item, at(place, i)); err != nil {
			return err
		}
	}
	return nil
}

// furthest bounds how far from the origin anything may lie, in grid steps: fifty metres of paper.
const furthest = 10000

func readWhole(value any, place string) (int, error) {
	number, ok := value.(float64)
	switch {
	case !ok || number > furthest || number < -furthest:
		return 0, refuse(place, "write a whole number of grid steps, at most %d", furthest)
	case number != float64(int(number)):
		return 0, refuse(place, "%v is not a whole number of grid steps", number)
	}
	return int(number), nil
}

func readPoint(value any, place string) (Point, error) {
	items, ok := value.([]any)
	if !ok || len(items) != 2 {
		return Point{}, refuse(place, "write a place as [x, y]")
	}
	x, err := readWhole(items[0], place)
	if err != nil {
		return Point{}, err
	}
	y, err := readWhole(items[1], place)
	return Point{x, y}, err
}

// intoText reads a text into a string.
func intoText(target *string) reader {
	return func(value any, place string) error {
		text, ok := value.(string)
		if !ok {
			return refuse(place, "write it as text")
		}
		*target = text
		return nil
	}
}

// intoFlag reads yes or no.
func intoFlag(target *bool) reader {
	return func(value any, place string) error {
		flag, ok := value.(bool)
		if !ok {
			return refuse(place, "write true or false")
		}
		*target = flag
		return nil
	}
}

// intoPoint reads a place into a Point.
func intoPoint(target *Point) reader {
	return func(value any, place string) (err error) {
		*target, err = readPoint(value, place)
		return err
	}
}

// intoPoints reads a list of places.
func intoPoints(target *[]Point) reader {
	return func(value any, place string) error {
		items, ok := value.([]any)
		if !ok {
			return refuse(place, "write a list of places, each as [x, y]")
		}
		points := make([]Point, len(items))
		for i, item := range items {
			p, err := readPoint(item, "")
			if err != nil {
				_, err = readPoint(item, at(place, i)) // places are only worded when they are needed
				return err
			}
			points[i] = p
		}
		*target = points
		return nil
	}
}

// intoTexts reads a list of texts.
func intoTexts(target *[]string) reader {
	return func(value any, place string) error {
		return list(value, place, func(item any, place string) error {
			var text string
			err := intoText(&text)(item, place)
			*target = append(*target, text)
			return err
		})
	}
}

// intoNames reads an object whose fields are references and whose values are texts.
func intoNames(target *map[string]string) reader {
	return func(value any, place string) error {
		members, ok := value.(object)
		if !ok {
			return refuse(place, "write it as an object in braces")
		}
		names := make(map[string]string, len(members))
		for _, m := range members {
			var text string
			if err := intoText(&text)(m.value, under(place, m.key)); err != nil {
				return err
			}
			names[m.key] = text
		}
		if len(names) > 0 {
			*target = names
		}
		return nil
	}
}
