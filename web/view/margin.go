package view

import (
	"fmt"
	"maps"
	"math/cmplx"
	"regexp"
	"slices"
	"strings"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/quantity"
	"loopwright/schematic/trace"
)

// digits is how many significant digits the page shows of what is computed.
const digits = 4

// BuildMargin says in words what one case of a solved sheet came to.
func BuildMargin(sheet *schematic.Sheet, result *cases.Result, shown int) Margin {
	solved := &result.Cases[shown]
	margin := Margin{
		Empty:    len(result.Drawing.Branches) == 0 && len(sheet.Wires) == 0,
		Solved:   solved.Solved,
		Findings: findings(result.Drawing, solved),
	}
	margin.Meshes = meshLines(result.Drawing, solved)
	if !solved.Solved {
		return margin
	}
	margin.Fused = fused(result.Drawing, solved)
	margin.Equations = equations(solved)
	margin.Readings = readings(sheet, result.Drawing, solved)
	margin.Audit = audit(solved)
	return margin
}

func findings(drawing *trace.Drawing, solved *cases.Case) []Finding {
	var list []Finding
	if solved.Problem != nil && solved.Problem.Code != "empty" {
		list = append(list, Finding{solved.Problem.Code, "stop", "▲", solved.Problem.Message, solved.Problem.Parts})
	}
	alone := unconnected(drawing)
	for _, statement := range drawing.Statements {
		if len(statement.Refs) == 1 && alone[statement.Refs[0]] {
			continue
		}
		list = append(list, Finding{statement.Rule, "note", "○", statement.Says, statement.Refs})
	}
	if refs := slices.Sorted(maps.Keys(alone)); len(refs) > 0 {
		says := fmt.Sprintf("Not wired yet: -%s.", strings.Join(refs, ", -"))
		list = append(list, Finding{"open-pin", "note", "○", says, refs})
	}
	return list
}

// unconnected finds the parts of which no pin is joined to anything; one line for all of them says more than one for
// each pin.
func unconnected(drawing *trace.Drawing) map[string]bool {
	open := map[string]int{}
	for _, statement := range drawing.Statements {
		if statement.Rule == "open-pin" {
			open[statement.Refs[0]]++
		}
	}
	alone := map[string]bool{}
	for ref, pins := range open {
		if part := drawing.Sheet.Part(ref); part != nil && pins == len(part.Kind.Pins) {
			alone[ref] = true
		}
	}
	return alone
}

func meshLines(drawing *trace.Drawing, solved *cases.Case) []MeshLine {
	lines := make([]MeshLine, len(drawing.Meshes))
	for i, mesh := range drawing.Meshes {
		line := MeshLine{Name: mesh.Name, Index: strings.TrimPrefix(mesh.Name, "m"), Drawn: mesh.Drawn, Current: "—"}
		if solved.Solved {
			line.Current = amount(solved.Meshes[i], quantity.Ampere)
		}
		line.Along = along(drawing, mesh)
		lines[i] = line
	}
	return lines
}

// along lists the parts of a mesh, the way the mesh runs.
func along(drawing *trace.Drawing, mesh trace.Mesh) string {
	const most = 5
	var refs []string
	for _, step := range mesh.Path {
		if ref := "-" + drawing.Branches[step.Branch].Ref; len(refs) == 0 || refs[len(refs)-1] != ref {
			refs = append(refs, ref)
		}
	}
	if len(refs) > most {
		refs = append(refs[:most], "…")
	}
	return strings.Join(refs, " ")
}

func fused(drawing *trace.Drawing, solved *cases.Case) []string {
	var list []string
	for _, super := range solved.Supermeshes {
		names := make([]string, len(super.Meshes))
		for i, mesh := range super.Meshes {
			names[i] = "i" + subscript(strings.TrimPrefix(drawing.Meshes[mesh].Name, "m"))
		}
		through := make([]string, 0, len(super.Through))
		for _, branch := range super.Through {
			through = append(through, "-"+drawing.Branches[branch].Ref)
		}
		list = append(list, fmt.Sprintf("%s form a supermesh through %s.", listed(names), listed(through)))
	}
	return list
}

// subscript writes a number in subscript digits.
func subscript(number string) string {
	return strings.Map(func(r rune) rune {
		if r >= '0' && r <= '9' {
			return '₀' + r - '0'
		}
		return r
	}, number)
}

// listed joins words as a sentence does: "a, b and c".
func listed(words []string) string {
	if len(words) < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:len(words)-1], ", ") + " and " + words[len(words)-1]
}

func equations(solved *cases.Case) []Equation {
	list := make([]Equation, 0, len(solved.Equations))
	for _, equation := range solved.Equations {
		list = append(list, Equation{Of: strings.Join(equation.Of, ", "), Symbols: lowered(equation.Symbols), Numbers: lowered(equation.Numbers)})
	}
	return list
}

// meshCurrent is a mesh current as the record writes it: i1.
var meshCurrent = regexp.MustCompile(`\bi[0-9]+\b`)

// lowered writes the numbers of mesh currents as subscripts.
func lowered(equation string) string {
	return meshCurrent.ReplaceAllStringFunc(equation, func(name string) string { return "i" + subscript(name[1:]) })
}

func readings(sheet *schematic.Sheet, drawing *trace.Drawing, solved *cases.Case) []Reading {
	list := make([]Reading, 0, len(drawing.Branches))
	for i, branch := range drawing.Branches {
		part := &sheet.Parts[branch.Part]
		reading := solved.Branches[i]
		row := Reading{Ref: branch.Ref, Kind: part.Kind.Title}
		if len(part.Kind.Pins) > 2 {
			row.Pins = branch.Pins[0] + "–" + branch.Pins[1]
		}
		current, power := reading.Current, reading.Voltage*cmplx.Conj(reading.Current)
		if part.Kind.Delivers {
			current, power = -current, -power
			row.Pins = "delivers"
			if real(power) < 0 {
				current, power, row.Pins = -current, -power, "takes"
			}
		}
		row.Current = amount(current, quantity.Ampere)
		row.Voltage, row.Power = "floating", "—"
		if !reading.Floating {
			row.Voltage = amount(reading.Voltage, quantity.Volt)
			row.Power = amount(power, quantity.Watt)
		}
		list = append(list, row)
	}
	return list
}

// amount writes a value: its size and, in AC, its angle; of a power, the real part.
func amount(value complex128, unit quantity.Unit) string {
	if unit == quantity.Watt {
		value = complex(real(value), 0)
	}
	return quantity.Phasor(value, unit, digits)
}

func audit(solved *cases.Case) Audit {
	figures := []Figure{
		{"current law at every potential", residual(solved.Audit.KCL)},
		{"voltage law around every mesh", residual(solved.Audit.KVL)},
		{"powers add to nothing", residual(solved.Audit.Power)},
		{"mesh against nodal analysis", residual(solved.Audit.NodalGap)},
	}
	return Audit{Passed: solved.Audit.Passed, Figures: figures,
		Says: "Arithmetic checked by two methods; accuracy is that of the values entered."}
}

func residual(value float64) string {
	if value == 0 {
		return "0"
	}
	return fmt.Sprintf("%.1e", value)
}
