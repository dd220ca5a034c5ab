// Package view holds the pages: templ components, and the models that they show. A model holds strings ready to be
// read; the functions that build models are pure, and the components only loop and choose.
package view

// Page is what every page needs.
type Page struct {
	Title  string
	Static func(string) string // address of a file of package static
}

// Role says what the holder of an address may do.
type Role string

// The roles.
const (
	Edit   Role = "edit"
	Review Role = "review"
	Look   Role = "view"
)

// Sheet is the page of one sheet, in one case.
type Sheet struct {
	Page
	Key      string
	Role     Role
	Revision int
	Author   string // of the edits that this page makes
	Size     string // of the paper: "A4"
	Number   string
	Heading  string
	Owner    string
	Set      string // the symbol set
	Drawing  string // the whole <svg id="sheet">
	Case     string // name of the shown case
	Strip    []Tab
	Margin   Margin
	Tray     []TrayGroup
	Printed  string // date of the print, in words
	Keys     []KeyGroup
}

// Editable reports whether the page's edits are taken.
func (s *Sheet) Editable() bool { return s.Role == Edit }

// Tab is a case in the strip above the sheet.
type Tab struct {
	Name   string
	Says   string // the current that the supplies deliver, or why there is none
	Shown  bool
	Solved bool
}

// Margin is the column beside the sheet.
type Margin struct {
	Findings  []Finding
	Meshes    []MeshLine
	Fused     []string // a sentence for each supermesh
	Equations []Equation
	Readings  []Reading
	Audit     Audit
	Solved    bool
	Empty     bool // nothing is drawn yet
}

// Finding is one line that wants attention.
type Finding struct {
	Rule  string
	Level string // "stop", "look" or "note"
	Sign  string // its shape: ▲, △ or ○
	Says  string
	Refs  []string
}

// MeshLine is a mesh and its current.
type MeshLine struct {
	Name    string // "m1"
	Index   string // what stands as subscript: "1"
	Current string
	Drawn   bool
	Along   string // the parts it runs through
}

// Equation is one line of the record.
type Equation struct {
	Of      string
	Symbols string
	Numbers string
}

// Reading is a row of the table of readings.
type Reading struct {
	Ref     string
	Kind    string
	Pins    string
	Voltage string
	Current string
	Power   string
}

// Audit says how well the two methods agree.
type Audit struct {
	Passed  bool
	Says    string
	Figures []Figure
}

// Figure is one of the audit's numbers.
type Figure struct{ Name, Value string }

// TrayGroup is a section of the tray.
type TrayGroup struct {
	Name    string
	Entries []TrayEntry
}

// TrayEntry is one thing that can be dragged onto the sheet.
type TrayEntry struct {
	Kind   string
	Title  string
	Find   string // lower-case words that find it
	Values string // as JSON, what it starts with
	Symbol string // an <svg>
	Reach  string // its pins as "x,y x,y", for the ghost
}

// KeyGroup is a section of the list of keys.
type KeyGroup struct {
	Name string
	Keys []KeyLine
}

// KeyLine is a key and what it does.
type KeyLine struct {
	Keys []string
	Does string
}

// Card is the callout of one part, or of one wire.
type Card struct {
	Case     string
	Ref      string // of a part; empty for a wire
	Wire     string // name of a wire; empty for a part
	Kind     string
	Editable bool
	Fields   []Field
	More     []Field // values that are seldom given
	Computed []Figure
	Limits   []Limit
	State    *State
}

// Field is one value of a part.
type Field struct {
	Name    string
	Title   string
	Value   string // as it was written, or the default
	Default string
	Choices []string // for a choice
	Flag    bool
	Yes     bool
	Numeric bool
}

// Limit is a computed value beside what is allowed.
type Limit struct {
	Says  string // "52 % of 2.5 A"
	Share int    // in per cent, for the bar, at most 125
	Over  bool
}

// State is where a part stands that can be operated.
type State struct {
	Says  string // "operated", "blown"
	Moves []Move // into the other positions
}

// Move puts a part into another position.
type Move struct{ Position, Says string }

// Link is one shared address of a sheet.
type Link struct {
	Name    string
	Role    string
	Address string
}

// Share is the panel of shared addresses.
type Share struct {
	Key   string
	Links []Link
	Error string
}

// Example is a sheet offered on the start page.
type Example struct {
	Name   string
	Number string
	Title  string
	Says   string
}

// Start is the start page.
type Start struct {
	Page
	Examples []Example
	Error    string
}
