package kinds

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strings"

	"loopwright/schematic/quantity"
)

// Form is what sort of thing a value is.
type Form uint8

// The forms of a value: a quantity with a unit, free text, one of a few words, yes or no, a list of names.
const (
	Quantity Form = iota
	Text
	Choice
	Flag
	Names
)

// Value is one value of a part. Written keeps what a person wrote ("4k7"), so that nobody's way of writing is lost; it
// is empty for a quantity given as a number.
type Value struct {
	Form    Form
	Number  float64 // of a quantity, in the unit of its Spec
	Written string  // of a quantity written as text, of a text, of a choice
	Yes     bool    // of a flag
	Names   []string
}

// Number is a quantity given as a number.
func Number(number float64) Value { return Value{Form: Quantity, Number: number} }

// Word is a choice or a text.
func Word(form Form, text string) Value { return Value{Form: form, Written: text} }

// MarshalJSON writes the value as it was written.
func (v Value) MarshalJSON() ([]byte, error) {
	switch {
	case v.Form == Flag:
		return json.Marshal(v.Yes)
	case v.Form == Names:
		return json.Marshal(v.Names)
	case v.Form == Quantity && v.Written == "":
		return json.Marshal(v.Number)
	}
	return json.Marshal(v.Written)
}

// written is a quantity together with how it is written.
func written(text string, number float64) Value {
	return Value{Form: Quantity, Number: number, Written: text}
}

// Same reports whether two values mean the same; how a quantity was written does not matter.
func (v Value) Same(w Value) bool {
	if v.Form != w.Form {
		return false
	}
	switch v.Form {
	case Quantity:
		return v.Number == w.Number
	case Flag:
		return v.Yes == w.Yes
	case Names:
		return slices.Equal(v.Names, w.Names)
	}
	return v.Written == w.Written
}

// Values are the values of a part by name. Those that are absent have their default.
type Values map[string]Value

// Spec describes one value of a kind.
type Spec struct {
	Name     string // as in sheet files
	Title    string // as people say it, in lower case
	Form     Form
	Unit     quantity.Unit
	Default  Value // meaningful unless Required or Optional is set
	Required bool  // must be given
	Optional bool  // may be absent, and then is not known
	Least    float64
	Most     float64  // both bounds count as allowed; 0 and 0 for no bounds
	Positive bool     // must be more than 0
	Choices  []string // of a Choice
}

// Filled are the values of a part together with the defaults of its kind.
type Filled struct {
	kind   *Kind
	values Values
}

// Fill completes values with the defaults of the kind.
func (k *Kind) Fill(values Values) Filled { return Filled{k, values} }

// Has reports whether a value was given, rather than left to its default.
func (f Filled) Has(name string) bool {
	_, ok := f.values[name]
	return ok
}

// Number is the quantity with a name, or its default; NaN when it is optional and absent.
func (f Filled) Number(name string) float64 {
	if value, ok := f.values[name]; ok {
		return value.Number
	}
	if spec, ok := f.kind.Spec(name); ok && !spec.Optional && !spec.Required {
		return spec.Default.Number
	}
	return math.NaN()
}

// Word is the text or choice with a name, or its default.
func (f Filled) Word(name string) string { return f.value(name).Written }

// Yes is the flag with a name, or its default.
func (f Filled) Yes(name string) bool { return f.value(name).Yes }

// Names is the list with a name, or its default.
func (f Filled) Names(name string) []string { return f.value(name).Names }

func (f Filled) value(name string) Value {
	if value, ok := f.values[name]; ok {
		return value
	}
	spec, _ := f.kind.Spec(name)
	return spec.Default
}

// Exact writes the quantity with a name as shortly as it can be read back: "4.7 kΩ".
func (f Filled) Exact(name string) string {
	spec, _ := f.kind.Spec(name)
	return quantity.Exact(f.Number(name), spec.Unit)
}

// legendOf makes the Legend that lists those of the named quantities that are known, parted by spaces.
func legendOf(names ...string) func(Filled) string {
	return func(values Filled) string {
		var known []string
		for _, name := range names {
			if !math.IsNaN(values.Number(name)) {
				known = append(known, values.Exact(name))
			}
		}
		return strings.Join(known, " ")
	}
}

// Read takes a value from what JSON holds: a float64, a string, a bool or a list. The error is one sentence without
// the name of the value.
func (s Spec) Read(raw any) (Value, error) {
	switch s.Form {
	case Quantity:
		return s.readQuantity(raw)
	case Flag:
		if yes, ok := raw.(bool); ok {
			return Value{Form: Flag, Yes: yes}, nil
		}
		return Value{}, fmt.Errorf("write true or false")
	case Names:
		return s.readNames(raw)
	}
	text, ok := raw.(string)
	if !ok {
		return Value{}, fmt.Errorf("write it as text")
	}
	return s.readText(text)
}

func (s Spec) readQuantity(raw any) (Value, error) {
	var value Value
	switch raw := raw.(type) {
	case float64:
		value = Number(raw)
	case string:
		number, err := quantity.Parse(raw, s.Unit)
		if err != nil {
			return Value{}, err
		}
		value = Value{Form: Quantity, Number: number, Written: strings.TrimSpace(raw)}
	default:
		return Value{}, fmt.Errorf("write a number, or text such as %q", quantity.Exact(1, s.Unit))
	}
	return value, s.bounds(value.Number)
}

func (s Spec) bounds(number float64) error {
	write := func(n float64) string { return quantity.Exact(n, s.Unit) }
	switch {
	case math.IsNaN(number) || math.IsInf(number, 0):
		return fmt.Errorf("must be a finite number")
	case s.Positive && number <= 0:
		return fmt.Errorf("%s is too small: it must be more than 0", write(number))
	case s.Least == 0 && s.Most == 0:
		return nil
	case number < s.Least:
		return fmt.Errorf("%s is too small: the least is %s", write(number), write(s.Least))
	case number > s.Most:
		return fmt.Errorf("%s is too large: the most is %s", write(number), write(s.Most))
	}
	return nil
}

// longestText bounds what a name or a text on the sheet may hold, in characters.
const longestText = 200

func (s Spec) readText(text string) (Value, error) {
	switch {
	case s.Form == Choice && !slices.Contains(s.Choices, text):
		return Value{}, fmt.Errorf("%q is not one of %s", text, strings.Join(s.Choices, ", "))
	case len([]rune(text)) > longestText:
		return Value{}, fmt.Errorf("the text is longer than %d characters", longestText)
	case strings.ContainsFunc(text, func(r rune) bool { return r < ' ' || r == 0x7f }):
		return Value{}, fmt.Errorf("the text holds a control character; leave it out")
	}
	return Word(s.Form, text), nil
}

func (s Spec) readNames(raw any) (Value, error) {
	list, ok := raw.([]any)
	if !ok {
		return Value{}, fmt.Errorf("write a list of names")
	}
	names := make([]string, 0, len(list))
	for _, item := range list {
		name, ok := item.(string)
		if !ok || strings.TrimSpace(name) == "" {
			return Value{}, fmt.Errorf("write a list of names, each a text")
		}
		if _, err := s.readText(name); err != nil {
			return Value{}, err
		}
		if slices.Contains(names, name) {
			return Value{}, fmt.Errorf("the name %q is there twice", name)
		}
		names = append(names, name)
	}
	return Value{Form: Names, Names: names}, nil
}
