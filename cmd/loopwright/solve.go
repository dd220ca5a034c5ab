package main

import (
	"bufio"
	"context"
	"encoding/json"
	"errors"
	"fmt"

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
	if errors.Is(err, context.Canceled) {
		return errors.New("interrupted before the sheet was solved; nothing was written")
	}
	if err != nil {
		return err
	}
	if only >= 0 {
		result = result.Only(only)
	}
	if err := c.write(s, result); err != nil {
		return err
	}
	return c.unsolved(s, result)
}

// unsolved is the error of a result in which a case has no solution. Readings have no line for such a case, so that beside
// them it is told apart.
func (c *solveCommand) unsolved(s streams, result *cases.Result) error {
	code := done
	for i := range result.Cases {
		if solved := &result.Cases[i]; !solved.Solved {
			code = unsolved
			if c.CSV {
				fmt.Fprintf(s.err, "loopwright: case %s has no solution: %s\n", solved.Name, solved.Problem.Message)
			}
		}
	}
	if code == done {
		return nil
	}
	return &exit{code: code}
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
