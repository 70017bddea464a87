package paper

import (
	"encoding/binary"
	"sort"
	"sync"

	"lastdrop/report/figure"
)

// Fonts are embedded without what paper does not need: instructions that fit
// outlines to coarse screens, and long names. That halves a short document.
// Layout of the tables: [ot] OpenType 1.9, chapters glyf, loca, head, name
// (from memory; the tests read the outcome with a font library).

// leanFonts holds the cut faces, made on first use.
var leanFonts = sync.OnceValue(func() map[figure.Face][]byte {
	out := map[figure.Face][]byte{}
	for _, f := range figure.Faces() {
		out[f] = lean(f.TTF())
	}
	return out
})

var be = binary.BigEndian

// lean returns the font without instructions and long names, or the font
// itself if it is not laid out as expected.
func lean(ttf []byte) []byte {
	tables, ok := fontTables(ttf)
	if !ok {
		return ttf
	}
	glyf, loca, ok := leanGlyphs(tables["glyf"], tables["loca"], be.Uint16(tables["head"][50:]) == 1)
	if !ok {
		return ttf
	}
	head := append([]byte(nil), tables["head"]...)
	be.PutUint16(head[50:], 1) // long offsets
	tables["head"], tables["glyf"], tables["loca"] = head, glyf, loca
	tables["name"] = leanNames(tables["name"])
	tables["hhea"], tables["hmtx"] = fullMetrics(tables["hhea"], tables["hmtx"], int(be.Uint16(tables["maxp"][4:])))
	for _, name := range [...]string{"fpgm", "prep", "cvt ", "gasp"} {
		delete(tables, name)
	}
	return assemble(tables)
}

// fontTables cuts a font file into its tables.
func fontTables(ttf []byte) (tables map[string][]byte, ok bool) {
	if len(ttf) < 12 || len(ttf) < 12+16*int(be.Uint16(ttf[4:])) {
		return nil, false
	}
	tables = map[string][]byte{}
	for i := range int(be.Uint16(ttf[4:])) {
		entry := ttf[12+16*i:]
		at, size := int(be.Uint32(entry[8:])), int(be.Uint32(entry[12:]))
		if at+size > len(ttf) {
			return nil, false
		}
		tables[string(entry[:4])] = ttf[at : at+size]
	}
	whole := len(tables["head"]) >= 54 && len(tables["hhea"]) >= 36 && len(tables["maxp"]) >= 6 && len(tables["name"]) >= 6
	return tables, whole && tables["glyf"] != nil && tables["loca"] != nil && tables["hmtx"] != nil
}

// leanGlyphs rewrites the outlines without instructions, and their offsets.
func leanGlyphs(glyf, loca []byte, long bool) (outlines, offsets []byte, ok bool) {
	offset := func(i int) int {
		if long {
			return int(be.Uint32(loca[4*i:]))
		}
		return 2 * int(be.Uint16(loca[2*i:]))
	}
	n := len(loca)/2 - 1
	if long {
		n = len(loca)/4 - 1
	}
	for i := range n {
		offsets = be.AppendUint32(offsets, uint32(len(outlines)))
		from, to := offset(i), offset(i+1)
		if from > to || to > len(glyf) {
			return nil, nil, false
		}
		g, ok := leanGlyph(glyf[from:to])
		if !ok {
			return nil, nil, false
		}
		outlines = append(outlines, g...)
		for len(outlines)%4 != 0 {
			outlines = append(outlines, 0)
		}
	}
	return outlines, be.AppendUint32(offsets, uint32(len(outlines))), true
}

// leanGlyph takes the instructions out of one outline.
func leanGlyph(g []byte) (out []byte, ok bool) {
	if len(g) == 0 {
		return nil, true
	}
	if len(g) < 12 {
		return nil, false
	}
	contours := int(int16(be.Uint16(g)))
	if contours < 0 {
		return leanCompound(g)
	}
	at := 10 + 2*contours
	if len(g) < at+2 || len(g) < at+2+int(be.Uint16(g[at:])) {
		return nil, false
	}
	out = append(append([]byte(nil), g[:at]...), 0, 0)
	return append(out, g[at+2+int(be.Uint16(g[at:])):]...), true
}

// Flags of the parts of a compound outline.
const (
	wordArguments    = 0x0001
	oneScale         = 0x0008
	moreParts        = 0x0020
	twoScales        = 0x0040
	fourScales       = 0x0080
	haveInstructions = 0x0100
)

func leanCompound(g []byte) (out []byte, ok bool) {
	out = append([]byte(nil), g...)
	for at := 10; at+4 <= len(g); {
		flags := be.Uint16(g[at:])
		be.PutUint16(out[at:], flags&^haveInstructions)
		at += 4 + 2
		if flags&wordArguments != 0 {
			at += 2
		}
		switch {
		case flags&oneScale != 0:
			at += 2
		case flags&twoScales != 0:
			at += 4
		case flags&fourScales != 0:
			at += 8
		}
		if flags&moreParts == 0 {
			return out[:min(at, len(out))], at <= len(out)
		}
	}
	return nil, false
}

// fullMetrics gives every glyph an advance of its own. Fonts of one width
// state it once for all; gofpdf 1.16.2 then writes bearings over the font that
// it reads (getMetrics appends to a part of it), so that a second document
// from the same bytes differs from the first.
func fullMetrics(hhea, hmtx []byte, glyphs int) (newHhea, newHmtx []byte) {
	n := int(be.Uint16(hhea[34:]))
	if n == 0 || n >= glyphs || len(hmtx) < 2*n+2*glyphs {
		return hhea, hmtx
	}
	newHmtx = append([]byte(nil), hmtx[:4*n]...)
	for g := n; g < glyphs; g++ {
		newHmtx = append(newHmtx, hmtx[4*(n-1)], hmtx[4*(n-1)+1])
		newHmtx = append(newHmtx, hmtx[2*n+2*g], hmtx[2*n+2*g+1])
	}
	newHhea = append([]byte(nil), hhea...)
	be.PutUint16(newHhea[34:], uint16(glyphs))
	return newHhea, newHmtx
}

// leanNames keeps the copyright notice and the names of the face.
func leanNames(name []byte) []byte {
	count, text := int(be.Uint16(name[2:])), int(be.Uint16(name[4:]))
	var entries, strings []byte
	kept := 0
	for i := range count {
		e := name[6+12*i:]
		id, size, at := be.Uint16(e[6:]), int(be.Uint16(e[8:])), text+int(be.Uint16(e[10:]))
		if be.Uint16(e) != 3 || id > 6 || at+size > len(name) {
			continue
		}
		kept++
		entries = append(entries, e[:10]...)
		entries = be.AppendUint16(entries, uint16(len(strings)))
		strings = append(strings, name[at:at+size]...)
	}
	out := be.AppendUint16(be.AppendUint16(be.AppendUint16(nil, 0), uint16(kept)), uint16(6+12*kept))
	return append(append(out, entries...), strings...)
}

// assemble joins tables to a font file. The check sums stay 0: the library
// that cuts the font to the characters in use writes its own.
func assemble(tables map[string][]byte) []byte {
	names := make([]string, 0, len(tables))
	for n := range tables {
		names = append(names, n)
	}
	sort.Strings(names)
	search := 1
	power := 0
	for search*2 <= len(names) {
		search, power = search*2, power+1
	}
	out := be.AppendUint32(nil, 0x00010000)
	for _, v := range [...]int{len(names), 16 * search, power, 16 * (len(names) - search)} {
		out = be.AppendUint16(out, uint16(v))
	}
	at := 12 + 16*len(names)
	for _, n := range names {
		out = append(out, n...)
		out = be.AppendUint32(out, 0)
		out = be.AppendUint32(out, uint32(at))
		out = be.AppendUint32(out, uint32(len(tables[n])))
		at += (len(tables[n]) + 3) &^ 3
	}
	for _, n := range names {
		out = append(out, tables[n]...)
		for len(out)%4 != 0 {
			out = append(out, 0)
		}
	}
	return out
}
