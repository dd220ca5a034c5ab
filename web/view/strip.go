package view

import (
	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/quantity"
)

// BuildStrip is the row of cases with what the supplies deliver in each.
func BuildStrip(sheet *schematic.Sheet, result *cases.Result, shown int) []Tab {
	tabs := make([]Tab, len(result.Cases))
	for i := range result.Cases {
		solved := &result.Cases[i]
		tabs[i] = Tab{Name: solved.Name, Shown: i == shown, Solved: solved.Solved, Says: caseSays(sheet, result, solved)}
	}
	return tabs
}

func caseSays(sheet *schematic.Sheet, result *cases.Result, solved *cases.Case) string {
	if !solved.Solved {
		if solved.Problem != nil && solved.Problem.Code == "empty" {
			return "nothing to solve"
		}
		return "▲ no solution"
	}
	var delivered complex128
	for i, branch := range result.Drawing.Branches {
		if sheet.Parts[branch.Part].Kind.Delivers {
			delivered -= solved.Branches[i].Current
		}
	}
	return amount(delivered, quantity.Ampere)
}
