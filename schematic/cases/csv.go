package cases

import (
	"bytes"
	"encoding/csv"
	"math"
	"math/cmplx"
	"strconv"
	"strings"

	"loopwright/schematic/trace"
)

// AppendCSV writes the readings of every solved case as comma-separated values, one line for each branch, with the signs of
// package kinds and in SI units. The header line is
//
//	case,part,pins,voltage_v,current_a,power_w
//
// in DC. In AC voltage and current are root mean square values, each with a column for its angle (voltage_deg and
// current_deg) behind it, and reactive_power_var is the last column. What floats has an empty voltage.
//
// A text that a spreadsheet would take for a formula has an apostrophe in front; numbers stay numbers.
func AppendCSV(out []byte, result *Result) []byte {
	var buffer bytes.Buffer
	w := csv.NewWriter(&buffer)
	ac := result.Drawing.Sheet.System.AC()
	header := []string{"case", "part", "pins", "voltage_v", "current_a", "power_w"}
	if ac {
		header = []string{"case", "part", "pins", "voltage_v", "voltage_deg", "current_a", "current_deg", "power_w", "reactive_power_var"}
	}
	_ = w.Write(header) // a bytes.Buffer takes everything
	for i := range result.Cases {
		c := &result.Cases[i]
		for b := range c.Branches {
			branch := &result.Drawing.Branches[b]
			_ = w.Write(append(texts(c, branch), figures(&c.Branches[b], ac)...))
		}
	}
	w.Flush()
	return append(out, buffer.Bytes()...)
}

// texts names a reading. The pins are joined by a word, since a spreadsheet takes 1-2 for a date.
func texts(c *Case, branch *trace.Branch) []string {
	return []string{inert(c.Name), inert(branch.Ref), inert(branch.Pins[0] + " to " + branch.Pins[1])}
}

func figures(reading *Reading, ac bool) []string {
	power := reading.Power()
	list := append(plain(reading.Voltage, ac), plain(reading.Current, ac)...)
	list = append(list, exact(real(power)))
	if ac {
		list = append(list, exact(imag(power)))
	}
	if reading.Floating {
		list[0] = ""
		if ac {
			list[1] = ""
		}
	}
	return list
}

// plain writes a value: in DC as it is, in AC as its magnitude and its angle.
func plain(value complex128, ac bool) []string {
	if !ac {
		return []string{exact(real(value))}
	}
	return []string{exact(cmplx.Abs(value)), exact(cmplx.Phase(value) * 180 / math.Pi)}
}

// exact writes a number as shortly as it reads back to the same.
func exact(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }

// inert keeps a spreadsheet from running a text.
func inert(text string) string {
	if strings.ContainsAny(text[:min(1, len(text))], "=+-@\t\r") {
		return "'" + text
	}
	return text
}
