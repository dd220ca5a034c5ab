package main

import (
	"bufio"
	"fmt"
	"strings"
	"unicode/utf8"
)

// table is set in columns with a line of headings above.
type table struct {
	head  []string
	rows  [][]string
	right int // columns from this one on are set to the right; 0 for none
}

// write sets the table and leaves a line free below it; a table without rows is left out.
func (t *table) write(out *bufio.Writer) {
	if len(t.rows) == 0 {
		return
	}
	widths := make([]int, len(t.head))
	for _, row := range append([][]string{t.head}, t.rows...) {
		for i, cell := range row {
			widths[i] = max(widths[i], utf8.RuneCountInString(cell))
		}
	}
	t.writeRow(out, t.head, widths)
	for _, row := range t.rows {
		t.writeRow(out, row, widths)
	}
	fmt.Fprintln(out)
}

func (t *table) writeRow(out *bufio.Writer, row []string, widths []int) {
	var line strings.Builder
	for i, cell := range row {
		pad := strings.Repeat(" ", widths[i]-utf8.RuneCountInString(cell))
		line.WriteString("  ")
		if t.right > 0 && i >= t.right {
			line.WriteString(pad + cell)
		} else {
			line.WriteString(cell + pad)
		}
	}
	fmt.Fprintln(out, strings.TrimRight(line.String(), " "))
}
