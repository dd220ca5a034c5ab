package view

// Keys is the list that the page shows on "?", for somebody who may edit or may only look.
func Keys(editable bool) []KeyGroup {
	look := []KeyGroup{
		{"Look", []KeyLine{
			{[]string{"Tab"}, "next part"},
			{[]string{"C"}, "next case"},
			{[]string{"Shift C"}, "case before"},
			{[]string{"M"}, "mesh currents shown or hidden"},
			{[]string{"+", "−"}, "zoom"},
			{[]string{"0"}, "fit the paper"},
			{[]string{"?"}, "this list"},
		}},
	}
	if !editable {
		return look
	}
	return append([]KeyGroup{
		{"Place", []KeyLine{
			{[]string{"/"}, "find a part in the tray; Enter puts it at the pencil point"},
			{[]string{"←", "↑", "→", "↓"}, "lead the pencil point, or move what is selected"},
			{[]string{"Shift", "arrow"}, "five steps at once"},
		}},
		{"Wire", []KeyLine{
			{[]string{"W"}, "begin a wire at the pencil point or at a pin of the selected part; again: its next pin"},
			{[]string{"B"}, "bend the other way"},
			{[]string{"Enter"}, "fix a corner, or end on a pin or wire"},
			{[]string{"Shift Enter", "double click"}, "end the wire here"},
			{[]string{"J"}, "join the crossing at the pencil point"},
			{[]string{"Esc"}, "give up"},
		}},
		{"Change", []KeyLine{
			{[]string{"Enter", "double click"}, "type the part's value"},
			{[]string{"Shift Enter"}, "go to the part card"},
			{[]string{"Space", "click"}, "operate a switch in the shown case"},
			{[]string{"R"}, "turn"},
			{[]string{"F"}, "flip"},
			{[]string{"Del"}, "remove"},
			{[]string{"Ctrl A"}, "select all"},
			{[]string{"Ctrl Z"}, "undo"},
			{[]string{"Ctrl Shift Z"}, "redo"},
		}},
	}, look...)
}
