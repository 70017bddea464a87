package cells

import (
	"fmt"
	"strings"
	"testing"
)

// scanned writes rows as line:cell|cell, with ! for a row without line end and
// the fault with its offset in the line.
func scanned(body string, s Scanner) string {
	s.Body = []byte(body)
	var out []string
	var r Row
	for s.Next(&r) {
		line := fmt.Sprintf("%d:", r.Line)
		var cells []string
		for _, c := range r.Cells {
			text := string(s.Bytes(c))
			if c.Quoted {
				text = "<" + text + ">"
			}
			cells = append(cells, text)
		}
		line += strings.Join(cells, "|")
		if r.Comment {
			line += "comment " + body[r.From:r.To]
		}
		if r.Fault != "" {
			line += fmt.Sprintf(" [%s at %d]", r.Fault, r.FaultAt-r.From)
		}
		if !r.Ended {
			line += "!"
		}
		out = append(out, line)
	}
	return strings.Join(out, "\n")
}

func TestScan(t *testing.T) {
	comma := Scanner{Delimiter: ',', Quote: '"', Comment: '#'}
	tab := Scanner{Delimiter: '\t', Quote: '"'}
	for _, c := range []struct {
		name string
		s    Scanner
		body string
		want string
	}{
		{"nothing", comma, "", ""},
		{"LF", comma, "a,b\nc,d\n", "1:a|b\n2:c|d"},
		{"CR", comma, "a,b\rc,d\r", "1:a|b\n2:c|d"},
		{"CRLF", comma, "a,b\r\nc,d\r\n", "1:a|b\n2:c|d"},
		{"mixed, CR CR LF is a blank line", comma, "a\r\r\nb\n\rc", "1:a\n2:\n3:b\n4:\n5:c!"},
		{"no line end", comma, "a,b\nc,", "1:a|b\n2:c|!"},
		{"empty cells stay", tab, "a\t\tb\t\n", "1:a||b|"},
		{"blanks around cells", comma, " a , b c  ,\td \n", "1:a|b c|\td"},
		{"blanks around a tab", tab, " a \t b\n", "1:a|b"},
		{"quotes", comma, "\"a,b\",\"say \"\"hi\"\"\",\"\"\n", "1:<a,b>|<say \"hi\">|<>"},
		{"blanks outside quotes", comma, " \" a \" ,b\n", "1:< a >|b"},
		{"quote inside a cell", comma, "5\" pipe,b\n", "1:5\" pipe|b"},
		{"quote not closed, next row lives", comma, "a,\"b\nc,d\n", "1:a [a quote that is not closed on its line at 2]\n2:c|d"},
		{"quote not closed at the end", comma, "a,\"b\"\"", "1:a [a quote that is not closed on its line at 2]!"},
		{"text after a quote", comma, "\"a\"b,c\nd\n", "1:<a> [text after a closing quote at 3]\n2:d"},
		{"no quotes in the dialect", Scanner{Delimiter: ','}, "\"a,b\"\n", "1:\"a|b\""},
		{"comments", comma, "# a, \"b\n #c\na#b\n", "1:comment # a, \"b\n2:comment  #c\n3:a#b"},
		{"comment without line end", comma, "#", "1:comment #!"},
		{"no other line ends", comma, "a\u0085b\u2028c\vd\fe\n", "1:a\u0085b\u2028c\vd\fe"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := scanned(c.body, c.s); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}

func TestBlankAndEmptyTail(t *testing.T) {
	s := Scanner{Body: []byte(",, \n\"\",\na,,\n"), Delimiter: ',', Quote: '"'}
	var r Row
	for _, want := range []struct {
		blank bool
		cells int // after the tail beyond one cell is dropped
	}{{true, 1}, {false, 1}, {false, 1}} {
		s.Next(&r)
		if r.Blank() != want.blank {
			t.Errorf("line %d: blank %t", r.Line, r.Blank())
		}
		if !r.DropEmptyTail(1) || len(r.Cells) != want.cells {
			t.Errorf("line %d: %d cells, want %d", r.Line, len(r.Cells), want.cells)
		}
	}
}

// Every byte of the text but line ends belongs to exactly one row, cells lie
// inside their row and in order.
func FuzzScan(f *testing.F) {
	f.Add([]byte("a,\"b\"\"\"\r\n#c\r,\n\"x"), false)
	f.Add([]byte("a\\,\"\\\"\"\\\n"), true)
	f.Fuzz(func(t *testing.T, body []byte, escapes bool) {
		s := Scanner{Body: body, Delimiter: ',', Quote: '"', Comment: '#'}
		if escapes {
			s.Escape = '\\'
		}
		var r Row
		next := 0
		for s.Next(&r) {
			if strings.Trim(string(body[next:r.From]), "\r\n") != "" || r.From > r.To || r.To > len(body) {
				t.Fatalf("%q: row %d from %d to %d after %d", body, r.Line, r.From, r.To, next)
			}
			at := r.From
			for _, c := range r.Cells {
				if c.From < at || c.To < c.From || c.To > r.To {
					t.Fatalf("%q: cell %+v of row %d to %d", body, c, r.From, r.To)
				}
				at = c.To
				s.Bytes(c)
			}
			if r.Fault != "" && (r.FaultAt < r.From || r.FaultAt > r.To) {
				t.Fatalf("%q: fault at %d", body, r.FaultAt)
			}
			next = r.To
		}
		if strings.Trim(string(body[next:]), "\r\n") != "" {
			t.Fatalf("%q: the rows end at %d", body, next)
		}
	})
}
