package cases_test

import (
	"io/fs"
	"testing"

	"loopwright/schematic"
	"loopwright/testdata"
)

func TestDemoSheetsAreSolvedInEveryCase(t *testing.T) {
	files, err := fs.Glob(testdata.Demo, "demo/*.sheet.json")
	if err != nil || len(files) < 3 {
		t.Fatalf("%d demo sheets, %v", len(files), err)
	}
	for _, file := range files {
		data, err := testdata.Demo.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		sheet, err := schematic.Decode(data)
		if err != nil {
			t.Fatalf("%s: %v", file, err)
		}
		result := solve(t, sheet)
		for _, statement := range result.Drawing.Statements {
			t.Errorf("%s: %s", file, statement.Says)
		}
		for _, mesh := range result.Drawing.Meshes {
			if !mesh.Drawn || mesh.Radius < 3 {
				t.Errorf("%s: %s leaves %g steps for its arrow", file, mesh.Name, mesh.Radius)
			}
		}
		for i := range result.Cases {
			if c := &result.Cases[i]; !c.Solved || !c.Audit.Passed {
				t.Errorf("%s: case %s is not solved: %+v", file, c.Name, c.Problem)
			}
		}
	}
}
