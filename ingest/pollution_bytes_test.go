package ingest_test

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	"lastdrop/schemas"
)

// flips change single bits of the bytes.
func (p *polluter) flips() {
	data := p.encode(p.clean.text)
	for range 250 {
		i, bit := p.rng.IntN(len(data)), p.rng.IntN(8)
		flipped := bytes.Clone(data)
		flipped[i] ^= 1 << bit
		mark := oneCell
		if digits(data[i:i+1]) && digits(flipped[i:i+1]) {
			mark = isApart
		}
		p.bytes("bit flipped", fmt.Sprintf("byte %d, bit %d", i, bit), flipped, mark)
	}
	for range 50 {
		i := p.rng.IntN(len(data))
		n := min(1+p.rng.IntN(4), len(data)-i)
		mark := cut
		if digits(data[i : i+n]) {
			mark = isApart
		}
		p.bytes("bytes lost", fmt.Sprintf("%d from byte %d", n, i), slices.Delete(bytes.Clone(data), i, i+n), mark)
	}
}

// digits reports whether bytes are digits or points: without or instead of
// them another number is left.
func digits(b []byte) bool { return len(bytes.Trim(b, ".0123456789")) == 0 }

// lineEnds changes the line ends, all alike and mixed.
func (p *polluter) lineEnds() {
	for _, eol := range []string{"\n", "\r", "\r\n"} {
		if eol != p.eol {
			p.text("line ends", fmt.Sprintf("%q", eol), strings.ReplaceAll(p.clean.text, p.eol, eol), intact)
		}
	}
	for n := range 3 {
		var b strings.Builder
		for i, line := range p.body {
			b.WriteString(line)
			if i < len(p.body)-1 {
				b.WriteString([]string{"\n", "\r\n"}[p.rng.IntN(2)])
			}
		}
		p.text("line ends", fmt.Sprintf("mixed %d", n), b.String(), intact)
	}
}

// encodings writes the text in another encoding, or a part of it.
func (p *polluter) encodings() {
	all := []coding{{schemas.UTF8, "", false}, {schemas.UTF8, "\xef\xbb\xbf", false}, {schemas.Windows1252, "", false},
		{schemas.UTF16LE, "\xff\xfe", false}, {schemas.UTF16LE, "\xfe\xff", true}, {schemas.UTF16LE, "", false}, {schemas.UTF16LE, "", true}}
	for _, c := range all {
		if c == p.coding {
			continue
		}
		var more []func(*pollution)
		if c.encoding == p.coding.encoding && c.upper == p.coding.upper && (c.encoding == schemas.UTF8 || p.schema.Dialect.Encoding != schemas.UTF16) ||
			c.mark != "" && c.encoding == schemas.UTF16LE && (p.schema.Dialect.Encoding == schemas.UTF16 || p.schema.Dialect.Encoding == schemas.Auto) {
			more = append(more, intact)
		}
		what := fmt.Sprintf("%s, mark %q, high byte first %v", c.encoding, c.mark, c.upper)
		p.bytes("encoding", what, c.encode(p.clean.text), more...)
		half := strings.Index(p.clean.text[len(p.clean.text)/2:], p.eol) + len(p.clean.text)/2
		p.bytes("encodings mixed", what, append(p.encode(p.clean.text[:half]), c.encode(p.clean.text[half:])...))
	}
}
