package main

import (
	"bufio"
	"fmt"
	"math"
	"math/cmplx"
	"strings"
	"unicode/utf8"

	"loopwright/schematic/cases"
	"loopwright/schematic/quantity"
	"loopwright/schematic/trace"
)

// digits is how many significant digits the report shows.
const digits = 4

// writeReport writes a result for people: for each case its readings, mesh currents and equations.
func writeReport(out *bufio.Writer, result *cases.Result) {
	sheet := result.Drawing.Sheet
	fmt.Fprintln(out, strings.TrimSpace(sheet.Title+"  "+sheet.Number))
	for i := range result.Cases {
		c := &result.Cases[i]
		fmt.Fprintf(out, "\nCase %s, supply %s\n", c.Name, c.Supply)
		if !c.Solved {
			fmt.Fprintf(out, "  No solution. %s\n", c.Problem.Message)
			continue
		}
		writeReadings(out, result.Drawing, c)
		writeMeshes(out, result.Drawing, c)
		writeEquations(out, c)
		fmt.Fprintf(out, "\n  Arithmetic checked by two methods (largest difference %.1e); accuracy is that of the values entered.\n", c.Audit.NodalGap)
	}
	for _, statement := range result.Drawing.Statements {
		fmt.Fprintf(out, "\nNote: %s\n", statement.Says)
	}
}

func writeReadings(out *bufio.Writer, drawing *trace.Drawing, c *cases.Case) {
	rows := [][]string{{"part", "pins", "voltage", "current", "power"}}
	for b, branch := range drawing.Branches {
		r := c.Branches[b]
		row := []string{"-" + branch.Ref, branch.Pins[0] + "–" + branch.Pins[1], "floating", amount(r.Current, quantity.Ampere), "—"}
		if !r.Floating {
			row[2] = amount(r.Voltage, quantity.Volt)
			row[4] = quantity.Format(real(r.Power()), quantity.Watt, digits)
		}
		rows = append(rows, row)
	}
	writeTable(out, rows)
}

func writeMeshes(out *bufio.Writer, drawing *trace.Drawing, c *cases.Case) {
	rows := [][]string{{"mesh", "current", "along"}}
	for m, mesh := range drawing.Meshes {
		along := make([]string, len(mesh.Path))
		for i, step := range mesh.Path {
			along[i] = "-" + drawing.Branches[step.Branch].Ref
		}
		rows = append(rows, []string{strings.Replace(mesh.Name, "m", "i", 1), amount(c.Meshes[m], quantity.Ampere), strings.Join(along, " ")})
	}
	if len(rows) > 1 {
		fmt.Fprintln(out)
		writeTable(out, rows)
	}
}

func writeEquations(out *bufio.Writer, c *cases.Case) {
	if len(c.Equations) == 0 {
		return
	}
	fmt.Fprintln(out)
	for _, equation := range c.Equations {
		fmt.Fprintf(out, "  %s\n    %s\n    %s\n", strings.Join(equation.Of, ", "), equation.Symbols, equation.Numbers)
	}
}

// writeTable sets columns under one another: texts at the left, quantities at the right.
func writeTable(out *bufio.Writer, rows [][]string) {
	widths := make([]int, len(rows[0]))
	for _, row := range rows {
		for i, cell := range row {
			widths[i] = max(widths[i], utf8.RuneCountInString(cell))
		}
	}
	for _, row := range rows {
		var line strings.Builder
		for i, cell := range row {
			pad := strings.Repeat(" ", widths[i]-utf8.RuneCountInString(cell))
			quantities := rows[0][i] == "voltage" || rows[0][i] == "current" || rows[0][i] == "power"
			if quantities {
				line.WriteString("  " + pad + cell)
			} else {
				line.WriteString("  " + cell + pad)
			}
		}
		fmt.Fprintln(out, strings.TrimRight(line.String(), " "))
	}
}

// amount writes a value, in AC with its angle.
func amount(v complex128, unit quantity.Unit) string {
	if imag(v) == 0 {
		return quantity.Format(real(v), unit, digits)
	}
	return quantity.Format(cmplx.Abs(v), unit, digits) + " ∠" + quantity.Format(cmplx.Phase(v)*180/math.Pi, quantity.Degree, digits)
}
