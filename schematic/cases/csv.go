package cases

import (
	"bytes"
	"encoding/csv"
	"strconv"
	"strings"
)

// AppendCSV writes the readings of every solved case as comma-separated values with a header line: one line a branch.
// Voltages and currents are the real and imaginary parts of phasors; in DC the imaginary parts are 0. A text that a
// spreadsheet would take for a formula has an apostrophe in front; numbers stay numbers.
func AppendCSV(out []byte, result *Result) []byte {
	var buffer bytes.Buffer
	w := csv.NewWriter(&buffer)
	rows := [][]string{{"case", "part", "pins", "voltage_re_v", "voltage_im_v", "current_re_a", "current_im_a", "power_w", "reactive_power_var"}}
	for i := range result.Cases {
		rows = append(rows, csvRows(result, &result.Cases[i])...)
	}
	_ = w.WriteAll(rows) // a bytes.Buffer takes everything
	return append(out, buffer.Bytes()...)
}

func csvRows(result *Result, c *Case) [][]string {
	if !c.Solved {
		return nil
	}
	rows := make([][]string, 0, len(result.Drawing.Branches))
	for b, branch := range result.Drawing.Branches {
		reading := c.Branches[b]
		power := reading.Power()
		row := []string{inert(c.Name), inert(branch.Ref), inert(branch.Pins[0] + "-" + branch.Pins[1]), "", "",
			plainNumber(real(reading.Current)), plainNumber(imag(reading.Current)), "", ""}
		if !reading.Floating {
			row[3], row[4] = plainNumber(real(reading.Voltage)), plainNumber(imag(reading.Voltage))
			row[7], row[8] = plainNumber(real(power)), plainNumber(imag(power))
		}
		rows = append(rows, row)
	}
	return rows
}

func plainNumber(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }

// inert keeps a spreadsheet from running a text.
func inert(text string) string {
	if strings.ContainsAny(text[:min(1, len(text))], "=+-@\t\r") {
		return "'" + text
	}
	return text
}
