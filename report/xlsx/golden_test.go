package xlsx

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/xuri/excelize/v2"
)

var update = flag.Bool("update", false, "write the golden listings anew")

// The sheets in sentences as a listing: cell, text, number format where there
// is one, and where a link leads.
func TestListings(t *testing.T) {
	w := write(t, inventedNight())
	for _, sheet := range w.file.GetSheetList() {
		got := w.listing(sheet)
		path := filepath.Join("testdata", strings.ToLower(sheet)+".txt")
		if *update {
			if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
				t.Fatal(err)
			}
		}
		want, err := os.ReadFile(path)
		if err != nil {
			t.Fatalf("%v; write it with -update and read it", err)
		}
		if got != string(want) {
			t.Errorf("%s differs from %s:\n%s", sheet, path, firstDifference(got, string(want)))
		}
	}
}

func (w written) listing(sheet string) string {
	w.Helper()
	rows, err := w.file.GetRows(sheet)
	if err != nil {
		w.Fatal(err)
	}
	var b strings.Builder
	for r, row := range rows {
		for c, value := range row {
			if value == "" {
				continue
			}
			name, err := excelize.CoordinatesToCellName(c+1, r+1)
			if err != nil {
				w.Fatal(err)
			}
			fmt.Fprintf(&b, "%s\t%s", name, value)
			if f := w.style(sheet, name).CustomNumFmt; f != nil {
				shown, _, _ := strings.Cut(*f, ";")
				fmt.Fprintf(&b, "\t%s", shown)
			}
			if has, target, _ := w.file.GetCellHyperLink(sheet, name); has {
				fmt.Fprintf(&b, "\t-> %s", target)
			}
			b.WriteString("\n")
		}
	}
	return b.String()
}

func firstDifference(got, want string) string {
	g, w := strings.Split(got, "\n"), strings.Split(want, "\n")
	for i := 0; i < len(g) && i < len(w); i++ {
		if g[i] != w[i] {
			return fmt.Sprintf("line %d\n got %q\nwant %q", i+1, g[i], w[i])
		}
	}
	return fmt.Sprintf("%d lines, want %d", len(g), len(w))
}
