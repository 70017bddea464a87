package pdf

import (
	"bytes"
	"os"
	"path/filepath"
	"testing"

	"lastdrop/report"
)

// TestLook writes the sorts of nights into the folder that LOOK names, to be
// rendered and looked at; without it nothing is written.
func TestLook(t *testing.T) {
	dir := os.Getenv("LOOK")
	if dir == "" {
		t.Skip("set LOOK to a folder to write the pages into")
	}
	for name, c := range nights() {
		for sheet, letter := range map[string]bool{"a4": false, "letter": true} {
			book, err := Plan(c.night, Options{Letter: letter, Pages: c.pages})
			if err != nil {
				t.Fatal(name, err)
			}
			for v := 1; v <= book.Volumes(); v++ {
				var b bytes.Buffer
				res, err := book.Write(&b, v)
				if err != nil {
					t.Fatal(name, err)
				}
				t.Log(name, sheet, "volume", v, res.Pages, "pages", b.Len()/res.Pages, "bytes a page", res.Failed, res.Replaced)
				if err := os.WriteFile(filepath.Join(dir, name+"-"+sheet+"-"+FileName(v)), b.Bytes(), 0o644); err != nil {
					t.Fatal(err)
				}
			}
		}
	}
}

type nightCase struct {
	night *report.Night
	pages string
}

func nights() map[string]nightCase {
	return map[string]nightCase{
		"demo":  {demoNight(), ""},
		"all":   {demoNight(), "all"},
		"empty": {emptyNight(), ""},
		"sound": {soundNight(9), ""},
		"large": {largeNight(), ""},
		"hard":  {hardNight(), ""},
		"bare":  {bareNight(), "all"},
		"seeds": {seedNight(), ""},
	}
}
