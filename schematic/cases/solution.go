package cases

import (
	"encoding/json"
	"time"

	"loopwright/schematic/trace"
)

// Format is the name of the format in which a Result is written as JSON.
const Format = "loopwright-solution/1"

// value is a number in a solution file. In DC, Im is 0.
type value struct {
	Re float64 `json:"re"`
	Im float64 `json:"im"`
}

func written(v complex128) value { return value{real(v), imag(v)} }

// voltage is null where it is not defined.
func (r Reading) voltage() *value {
	if r.Floating {
		return nil
	}
	v := written(r.Voltage)
	return &v
}

type solutionFile struct {
	Format string         `json:"format"`
	Title  string         `json:"title"`
	System map[string]any `json:"system"`
	Timing timingFile     `json:"timing"`
	Cases  []caseFile     `json:"cases"`
}

type timingFile struct {
	Trace float64 `json:"trace_s"`
	Mesh  float64 `json:"mesh_s"`
	Solve float64 `json:"solve_s"`
	Audit float64 `json:"audit_s"`
}

type caseFile struct {
	Name      string            `json:"name"`
	Solved    bool              `json:"solved"`
	Problem   *Problem          `json:"problem"`
	Supply    string            `json:"supply"`
	Positions map[string]string `json:"positions"`
	Coils     map[string]string `json:"coils"`
	*solvedFile
}

// solvedFile is what only a solved case has.
type solvedFile struct {
	Potentials  []potentialFile `json:"potentials"`
	Parts       []partFile      `json:"parts"`
	Meshes      []meshFile      `json:"meshes"`
	Supermeshes []supermeshFile `json:"supermeshes"`
	Equations   []equationFile  `json:"equations"`
	Audit       auditFile       `json:"audit"`
}

type potentialFile struct {
	Number     string   `json:"number"`
	WireNumber string   `json:"wire_number"`
	Name       string   `json:"name"`
	Pins       []string `json:"pins"`
	Voltage    *value   `json:"voltage"`
	Floating   bool     `json:"floating,omitempty"`
}

type partFile struct {
	Ref      string       `json:"ref"`
	Voltage  *value       `json:"voltage"`
	Floating bool         `json:"floating,omitempty"`
	Current  value        `json:"current"`
	Power    value        `json:"power"`
	Branches []branchFile `json:"branches"`
}

type branchFile struct {
	Pins     [2]string `json:"pins"`
	Voltage  *value    `json:"voltage"`
	Floating bool      `json:"floating,omitempty"`
	Current  value     `json:"current"`
	Meshes   string    `json:"mesh_currents"` // the current as a sum of mesh currents
}

type meshFile struct {
	Name    string     `json:"name"`
	Current value      `json:"current"`
	Drawn   bool       `json:"drawn"`
	Path    []stepFile `json:"path"`
}

type stepFile struct {
	Ref   string    `json:"ref"`
	Pins  [2]string `json:"pins"`
	Sense int       `json:"sense"`
}

type supermeshFile struct {
	Meshes  []string `json:"meshes"`
	Through []string `json:"through"`
}

type equationFile struct {
	Of      []string `json:"of"`
	Symbols string   `json:"symbols"`
	Numbers string   `json:"numbers"`
}

type auditFile struct {
	KCL      float64 `json:"kcl"`
	KVL      float64 `json:"kvl"`
	Power    float64 `json:"power"`
	NodalGap float64 `json:"nodal_gap"`
	Passed   bool    `json:"passed"`
}

// MarshalJSON writes the result as a solution file.
func (r *Result) MarshalJSON() ([]byte, error) { return json.Marshal(r.file(r.Cases)) }

// Only is the result with just one of its cases.
func (r *Result) Only(index int) *Result {
	return &Result{r.Drawing, r.Cases[index : index+1], r.Timing}
}

func (r *Result) file(list []Case) solutionFile {
	sheet := r.Drawing.Sheet
	system := map[string]any{"kind": sheet.System.Kind}
	if sheet.System.AC() {
		system["hz"] = sheet.System.Hertz
	}
	seconds := func(d time.Duration) float64 { return d.Seconds() }
	file := solutionFile{Format, sheet.Title, system,
		timingFile{seconds(r.Timing.Trace), seconds(r.Timing.Mesh), seconds(r.Timing.Solve), seconds(r.Timing.Audit)}, []caseFile{}}
	for i := range list {
		c := &list[i]
		out := caseFile{c.Name, c.Solved, c.Problem, string(c.Supply), c.Positions, map[string]string{}, nil}
		if c.Solved {
			out.solvedFile = c.file(r.Drawing)
		}
		file.Cases = append(file.Cases, out)
	}
	return file
}

func (c *Case) file(drawing *trace.Drawing) *solvedFile {
	f := &solvedFile{Potentials: []potentialFile{}, Parts: c.partFiles(drawing), Meshes: []meshFile{}, Supermeshes: []supermeshFile{}, Equations: []equationFile{}}
	for i, p := range drawing.Potentials {
		reading := c.Potentials[i]
		f.Potentials = append(f.Potentials, potentialFile{p.Number, p.WireNumber, p.Name, p.Pins, reading.voltage(), reading.Floating})
	}
	for i, mesh := range drawing.Meshes {
		path := make([]stepFile, len(mesh.Path))
		for k, step := range mesh.Path {
			branch := &drawing.Branches[step.Branch]
			path[k] = stepFile{branch.Ref, branch.Pins, step.Sense}
		}
		f.Meshes = append(f.Meshes, meshFile{mesh.Name, written(c.Meshes[i]), mesh.Drawn, path})
	}
	for _, super := range c.Supermeshes {
		names := make([]string, len(super.Meshes))
		for i, m := range super.Meshes {
			names[i] = drawing.Meshes[m].Name
		}
		f.Supermeshes = append(f.Supermeshes, supermeshFile{names, refsOf(drawing, super.Through)})
	}
	for _, equation := range c.Equations {
		f.Equations = append(f.Equations, equationFile(equation))
	}
	f.Audit = auditFile{c.Audit.KCL, c.Audit.KVL, c.Audit.Power, c.Audit.NodalGap, c.Audit.Passed}
	return f
}

func (c *Case) partFiles(drawing *trace.Drawing) []partFile {
	parts := []partFile{}
	sums := meshCurrents(drawing)
	for b, branch := range drawing.Branches {
		reading := c.Branches[b]
		if branch.Index == 0 {
			parts = append(parts, partFile{Ref: branch.Ref, Voltage: reading.voltage(), Floating: reading.Floating, Current: written(reading.Current)})
		}
		part := &parts[len(parts)-1]
		part.Branches = append(part.Branches, branchFile{branch.Pins, reading.voltage(), reading.Floating, written(reading.Current), sums[b]})
		if !reading.Floating {
			power := reading.Power()
			part.Power.Re += real(power)
			part.Power.Im += imag(power)
		}
	}
	return parts
}
