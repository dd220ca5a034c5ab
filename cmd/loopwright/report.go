package main

import (
	"bufio"
	"fmt"
	"slices"
	"strings"

	"loopwright/schematic"
	"loopwright/schematic/cases"
	"loopwright/schematic/quantity"
	"loopwright/schematic/trace"
)

// digits is how many significant digits the report shows.
const digits = 4

// writeReport writes a result for people: for each case its readings, potentials, equations and mesh currents.
func writeReport(out *bufio.Writer, result *cases.Result) {
	sheet := result.Drawing.Sheet
	fmt.Fprintln(out, strings.TrimSpace(sheet.Number+"  "+sheet.Title))
	for _, statement := range result.Drawing.Statements {
		fmt.Fprintf(out, "Note: %s\n", statement.Says)
	}
	for i := range result.Cases {
		writeCase(out, result.Drawing, &result.Cases[i])
	}
	if slices.ContainsFunc(result.Cases, func(c cases.Case) bool { return c.Solved }) {
		fmt.Fprint(out, "\nSigns: voltage from the first pin to the second, current into the first pin, power absorbed.\n",
			"Arithmetic checked by two methods; accuracy is that of the values entered.\n")
	}
}

func writeCase(out *bufio.Writer, drawing *trace.Drawing, c *cases.Case) {
	fmt.Fprintf(out, "\n%s: supply %s%s\n\n", c.Name, c.Supply, operated(drawing.Sheet, c))
	if !c.Solved {
		fmt.Fprintf(out, "  No solution (%s). %s\n", c.Problem.Code, c.Problem.Message)
		return
	}
	tables := []table{readings(drawing, c), potentials(drawing, c), equations(c), meshes(drawing, c)}
	for i := range tables {
		tables[i].write(out)
	}
	fmt.Fprintf(out, "  Audit: current law %s, voltage law %s, power %s, against nodal analysis %s of the largest value.\n",
		residual(c.Audit.KCL), residual(c.Audit.KVL), residual(c.Audit.Power), residual(c.Audit.NodalGap))
}

// operated lists the parts that do not stand at rest.
func operated(sheet *schematic.Sheet, c *cases.Case) string {
	var list strings.Builder
	for i := range sheet.Parts {
		part := &sheet.Parts[i]
		position, operates := c.Positions[part.Ref]
		if operates && position != part.Kind.Positions(part.Fill())[0] {
			list.WriteString(", -" + part.Ref + " " + position)
		}
	}
	if list.Len() == 0 {
		return ", all at rest"
	}
	return list.String()
}

func readings(drawing *trace.Drawing, c *cases.Case) table {
	t := table{head: []string{"part", "pins", "voltage", "current", "power"}, right: 2}
	for b, branch := range drawing.Branches {
		r := c.Branches[b]
		row := []string{"-" + branch.Ref, branch.Pins[0] + "–" + branch.Pins[1], voltage(r), quantity.Phasor(r.Current, quantity.Ampere, digits),
			quantity.Format(real(r.Power()), quantity.Watt, digits)}
		t.rows = append(t.rows, row)
	}
	return t
}

func potentials(drawing *trace.Drawing, c *cases.Case) table {
	t := table{head: []string{"potential", "name", "pins", "voltage"}, right: 3}
	for i, p := range drawing.Potentials {
		pins := make([]string, len(p.Pins))
		for k, pin := range p.Pins {
			pins[k] = "-" + pin
		}
		t.rows = append(t.rows, []string{p.Number, p.Name, strings.Join(pins, " "), voltage(c.Potentials[i])})
	}
	return t
}

func equations(c *cases.Case) table {
	t := table{head: []string{"meshes", "equation"}}
	for _, equation := range c.Equations {
		t.rows = append(t.rows, []string{strings.Join(equation.Of, ", "), equation.Symbols})
		if !strings.HasPrefix(equation.Symbols, equation.Numbers) { // that a contact is open is said only with symbols
			t.rows = append(t.rows, []string{"", equation.Numbers})
		}
	}
	return t
}

func meshes(drawing *trace.Drawing, c *cases.Case) table {
	t := table{head: []string{"mesh", "", "along", "current"}, right: 3}
	for m, mesh := range drawing.Meshes {
		along := make([]string, len(mesh.Path))
		for i, step := range mesh.Path {
			along[i] = "-" + drawing.Branches[step.Branch].Ref
		}
		drawn := "loop"
		if mesh.Drawn {
			drawn = "drawn"
		}
		t.rows = append(t.rows, []string{mesh.Name, drawn, strings.Join(along, " "),
			"i" + strings.TrimPrefix(mesh.Name, "m") + " = " + quantity.Phasor(c.Meshes[m], quantity.Ampere, digits)})
	}
	return t
}

func voltage(r cases.Reading) string {
	if r.Floating {
		return "floating"
	}
	return quantity.Phasor(r.Voltage, quantity.Volt, digits)
}

// residual writes a figure of the audit, of which only the size matters.
func residual(v float64) string {
	if v == 0 {
		return "0"
	}
	return fmt.Sprintf("%.0e", v)
}
