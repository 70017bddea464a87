package paper

import (
	"bytes"
	"compress/zlib"
	"errors"
	"fmt"
	"io"
	"strings"
	"testing"
)

// file is a small PDF file as gofpdf lays it out: the bodies of its objects
// from 3 on, then object 1.
func file(bodies ...string) []byte {
	var b bytes.Buffer
	b.WriteString("%PDF-1.3\n")
	at := map[int]int{}
	object := func(n int, body string) {
		at[n] = b.Len()
		fmt.Fprintf(&b, "%d 0 obj\n%s\nendobj\n", n, body)
	}
	for i, body := range bodies {
		object(i+2, body)
	}
	object(1, "<</Type /Pages\n>>")
	xref := b.Len()
	fmt.Fprintf(&b, "xref\n0 %d\n0000000000 65535 f \n", len(bodies)+2)
	for n := 1; n <= len(bodies)+1; n++ {
		fmt.Fprintf(&b, "%010d 00000 n \n", at[n])
	}
	fmt.Fprintf(&b, "trailer\n<<\n/Size %d\n>>\nstartxref\n%d\n%%%%EOF\n", len(bodies)+2, xref)
	return b.Bytes()
}

func stream(text string) string {
	return fmt.Sprintf("<</Length %d>>\nstream\n%s\nendstream", len(text), text)
}

// Every object is found at its place in the packed file; streams hold what
// they held, those that were compressed before too.
func TestPack(t *testing.T) {
	page := strings.Repeat("1 0 0 rg\n>>\nstream\nendstream\nendobj\nxref\n", 40) // no text may look like the file's own
	font := strings.Repeat("glyf", 30)
	var fast bytes.Buffer
	z := zlib.NewWriter(&fast)
	z.Write([]byte(font))
	z.Close()
	done := fmt.Sprintf("<</Length %d\n/Filter /FlateDecode\n/Length1 120\n>>\nstream\n%s\nendstream", fast.Len(), fast.String())
	var b bytes.Buffer
	if err := pack(file(stream(page), "<</Type /Page>>", done, stream("")), &b); err != nil {
		t.Fatal(err)
	}
	offsets, xref, err := references(b.Bytes())
	if err != nil || len(offsets) != 5 || !bytes.HasSuffix(b.Bytes(), []byte(fmt.Sprintf("startxref\n%d\n%%%%EOF\n", xref))) {
		t.Fatalf("%d objects, %v", len(offsets), err)
	}
	for n, want := range []string{"<</Type /Pages\n>>", page, "<</Type /Page>>", font, ""} {
		object := b.Bytes()[offsets[n]:]
		begin := fmt.Sprintf("%d 0 obj\n", n+1)
		if !bytes.HasPrefix(object, []byte(begin)) {
			t.Errorf("object %d does not begin where it should", n+1)
			continue
		}
		body := object[len(begin):]
		if n == 1 || n >= 3 {
			if !bytes.HasPrefix(body, []byte("<</Filter /FlateDecode /Length ")) {
				t.Fatalf("object %d is not compressed: %.60q", n+1, body)
			}
			head, stream, _ := bytes.Cut(body, []byte(">>\nstream\n"))
			if bytes.Contains(head, []byte("/Length1 120")) != (n == 3) {
				t.Errorf("object %d begins with %q", n+1, head)
			}
			body = stream
			z, err := zlib.NewReader(bytes.NewReader(body))
			if err != nil {
				t.Fatal(err)
			}
			if body, err = io.ReadAll(z); err != nil {
				t.Fatal(err)
			}
			if string(body) != want {
				t.Errorf("object %d holds %.60q", n+1, body)
			}
		} else if !bytes.HasPrefix(body, []byte(want)) {
			t.Errorf("object %d is %.60q, want %.60q", n+1, body, want)
		}
	}
}

func TestPackRefusesOtherLayouts(t *testing.T) {
	good := string(file(stream("x")))
	for name, raw := range map[string]string{
		"empty": "", "no table": strings.Replace(good, "\nxref\n", "\nxxxx\n", 1), "no end": strings.Replace(good, "startxref", "stopsxref", 1),
		"no trailer": strings.Replace(good, "trailer", "trail", 1), "offset beyond": strings.Replace(good, "0000000009", "0000999999", 1),
	} {
		if err := pack([]byte(raw), io.Discard); !errors.Is(err, errLayout) {
			t.Errorf("%s: got %v", name, err)
		}
	}
}
