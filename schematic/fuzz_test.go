package schematic_test

import (
	"bytes"
	"math/rand/v2"
	"testing"

	"loopwright/schematic"
)

func FuzzDecode(f *testing.F) {
	f.Add([]byte(`{"format":"loopwright-sheet/1","system":{"kind":"dc"},"parts":[{"ref":"R1","kind":"resistor","at":[1,2],"values":{"resistance":"4k7"}}],"wires":[{"points":[[1,0],[5,0]]}]}`))
	f.Add([]byte(`{"format":"loopwright-sheet/1","system":{"kind":"ac","hz":50},"cases":[{"name":"A"},{"name":"B","follows":"A"}]}`))
	f.Add([]byte(`{"format":"loopwright-sheet/1","system":{"kind":"dc"},"wires":[{"points":[[0,1],[2,1]]},{"points":[[1,0],[1,2]]}],"joints":[[1,1]]}`))
	f.Add([]byte(`[`))
	f.Fuzz(func(t *testing.T, data []byte) {
		sheet, err := schematic.Decode(data)
		if err != nil {
			return
		}
		written := schematic.Encode(sheet)
		again, err := schematic.Decode(written)
		if err != nil {
			t.Fatalf("what was written is refused: %v\n%s", err, written)
		}
		if !bytes.Equal(schematic.Encode(again), written) {
			t.Fatalf("writing back gives other bytes:\n%s\n%s", written, schematic.Encode(again))
		}
	})
}

func FuzzEdits(f *testing.F) {
	f.Add([]byte(`[{"do":"add","part":{"kind":"lamp","at":[3,4]}},{"do":"wire","points":[[3,2],[9,2]]},{"do":"move","refs":["P1"],"by":[1,0]}]`))
	f.Add([]byte(`[{"do":"set","ref":"P1","values":{"voltage":null,"power":"2 W"}}]`))
	f.Add([]byte(`[{"do":"sheet","set":{"system":{"kind":"ac","hz":50},"title":""}},{"do":"case","case":{"name":"A"},"after":"Rest"},{"do":"turn","refs":["R1","R2"]}]`))
	start := play(hand{pick: rand.New(rand.NewPCG(1, 2)).IntN}, 60, func(step) {})
	f.Fuzz(func(t *testing.T, data []byte) {
		edits, err := schematic.DecodeEdits(data)
		if err != nil {
			return
		}
		after, change, _, err := schematic.Apply(start, edits)
		if err != nil {
			return
		}
		back, err := schematic.Replay(after, change.Inverse())
		if err != nil || !bytes.Equal(schematic.Encode(back), schematic.Encode(start)) {
			t.Fatalf("undo gives another sheet (%v)", err)
		}
	})
}
