package web

import (
	"bytes"
	"context"
	"strconv"
	"strings"

	"github.com/a-h/templ"

	"loopwright/schematic/draw"
	"loopwright/web/view"
)

// frame is what a page shows of a sheet at one revision in one case, cut into the pieces that can change on their own:
// the groups of the drawing and the regions of HTML around it. What a page must be sent is the difference of two frames.
type frame struct {
	revision int
	groups   []piece // of the drawing, in the order in which they are drawn
	regions  []piece
}

// piece is one element of the page, written out, under its id.
type piece struct {
	id   string
	html []byte
}

// newFrame cuts a page into its pieces.
func newFrame(ctx context.Context, picture *draw.Picture, sheet *view.Sheet) (*frame, error) {
	f := &frame{revision: sheet.Revision, groups: make([]piece, len(picture.Groups))}
	// One buffer for all groups: most are far smaller than this, and growing each by itself costs more than drawing it.
	buffer := make([]byte, 0, 1200*len(picture.Groups))
	for i := range picture.Groups {
		start := len(buffer)
		buffer = picture.Groups[i].AppendSVG(buffer)
		f.groups[i] = piece{picture.Groups[i].ID, buffer[start:len(buffer):len(buffer)]}
	}
	for _, region := range []struct {
		id        string
		component templ.Component
	}{
		{"head", view.Head(sheet)},
		{"strip", view.Strip(sheet)},
		{"findings", view.Findings(&sheet.Margin)},
		{"meshes", view.Meshes(&sheet.Margin)},
		{"readings", view.Readings(&sheet.Margin)},
		{"audit", view.AuditLine(&sheet.Margin)},
		{"print-line", view.PrintLine(sheet)},
	} {
		var html bytes.Buffer
		if err := region.component.Render(ctx, &html); err != nil {
			return nil, err
		}
		f.regions = append(f.regions, piece{region.id, html.Bytes()})
	}
	return f, nil
}

// size is how many bytes the frame holds.
func (f *frame) size() int {
	total := 0
	for _, list := range [][]piece{f.groups, f.regions} {
		for _, p := range list {
			total += len(p.html) + len(p.id)
		}
	}
	return total
}

// patch writes what turns a page that shows the frame before into one that shows f: changed and new groups of the
// drawing in one piece, the ids of those that are gone, and the changed regions. Without a frame before, everything is
// sent, and the page drops what is not in it.
func (f *frame) patch(before *frame) []byte {
	var out bytes.Buffer
	var old frame
	out.WriteString(`<hx-patch revision="`)
	out.WriteString(strconv.Itoa(f.revision))
	if before == nil {
		out.WriteString(`" whole="`)
	} else {
		old = *before
		if gone := missing(old.groups, f.groups); len(gone) > 0 {
			out.WriteString(`" gone="`)
			out.WriteString(templ.EscapeString(strings.Join(gone, " ")))
		}
	}
	out.WriteString(`"><svg>`)
	for _, group := range changed(old.groups, f.groups) {
		out.Write(group.html)
	}
	out.WriteString(`</svg></hx-patch>`)
	for _, region := range changed(old.regions, f.regions) {
		out.WriteString(`<hx-partial id="` + region.id + `" hx-swap="outerMorph">`)
		out.Write(region.html)
		out.WriteString(`</hx-partial>`)
	}
	return out.Bytes()
}

// changed lists the pieces of now that are not in old, or are other there.
func changed(old, now []piece) []piece {
	known := make(map[string][]byte, len(old))
	for _, p := range old {
		known[p.id] = p.html
	}
	var list []piece
	for _, p := range now {
		if html, ok := known[p.id]; !ok || !bytes.Equal(html, p.html) {
			list = append(list, p)
		}
	}
	return list
}

// missing lists the ids that are in old and no longer in now.
func missing(old, now []piece) []string {
	kept := make(map[string]bool, len(now))
	for _, p := range now {
		kept[p.id] = true
	}
	var gone []string
	for _, p := range old {
		if !kept[p.id] {
			gone = append(gone, p.id)
		}
	}
	return gone
}
