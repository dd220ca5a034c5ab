package main

import (
	"bufio"
	"context"
	"encoding/json"

	"loopwright/schematic/cases"
)

type solveCommand struct {
	Sheet string `arg:"" help:"Sheet file, or - for standard input."`
	Case  string `help:"Only this case." placeholder:"NAME"`
	JSON  bool   `name:"json" help:"Write the solution as JSON." xor:"form"`
	CSV   bool   `name:"csv" help:"Write the readings as comma-separated values." xor:"form"`
}

// Run solves a sheet and writes the answer. The exit code is 1 when a case has no solution.
func (c *solveCommand) Run(ctx context.Context, s streams) error {
	sheet, err := readSheet(s, c.Sheet)
	if err != nil {
		return err
	}
	only := -1
	if c.Case != "" {
		if only, err = findCase(sheet, c.Case); err != nil {
			return err
		}
	}
	result, err := cases.Solve(ctx, sheet)
	if err != nil {
		return err
	}
	if only >= 0 {
		result = result.Only(only)
	}
	if err := c.write(s, result); err != nil {
		return err
	}
	for i := range result.Cases {
		if !result.Cases[i].Solved {
			return &exit{code: unsolved}
		}
	}
	return nil
}

func (c *solveCommand) write(s streams, result *cases.Result) error {
	out := bufio.NewWriter(s.out)
	switch {
	case c.JSON:
		encoder := json.NewEncoder(out)
		encoder.SetEscapeHTML(false)
		if err := encoder.Encode(result); err != nil {
			return err
		}
	case c.CSV:
		_, _ = out.Write(cases.AppendCSV(nil, result)) // Flush tells of errors
	default:
		writeReport(out, result)
	}
	return out.Flush()
}
