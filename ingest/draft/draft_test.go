package draft

import (
	"flag"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"lastdrop/ingest"
	"lastdrop/schemas"
)

var update = flag.Bool("update", false, "write the golden files anew")

const testdata = "../../testdata"

// readings are the converted readings of runs as text; facts that enter
// arithmetic and endpoints stand before them.
func readings(runs []ingest.Run) []string {
	var list []string
	for i := range runs {
		r := &runs[i]
		text := fmt.Sprintf("run %d %s", r.Number, r.Signal)
		for _, p := range r.Readings {
			text += fmt.Sprintf(" %v:%v", p.VolumeML, p.Value)
		}
		list = append(list, text)
	}
	return list
}

// numbersAgree reports whether every number of a draft's run is that of the
// shipped schema's; what the draft leaves out is no error.
func numbersAgree(draft, shipped *ingest.Run) bool {
	same := func(a, b *float64) bool { return a == nil || b != nil && *a == *b }
	a, b := draft.Facts, shipped.Facts
	if !same(a.AliquotML, b.AliquotML) || !same(a.SolventML, b.SolventML) || !same(a.TitrantMolPerL, b.TitrantMolPerL) || !same(a.EndReading, b.EndReading) || !same(a.TemperatureC, b.TemperatureC) {
		return false
	}
	for _, i := range draft.Indicated {
		if !slices.Contains(shipped.Indicated, i) {
			return false
		}
	}
	return a.Started == "" || a.Started == b.Started || strings.HasPrefix(b.Started, a.Started+"+") || strings.HasPrefix(b.Started, a.Started+"-") // the zone is not in the dump
}

func readWithDraft(t *testing.T, data []byte, name string) ([]ingest.Run, Report) {
	t.Helper()
	toml, report, err := Propose(data, name)
	if err != nil {
		t.Errorf("%s: %v", name, err)
		return nil, report
	}
	s, err := schemas.Parse("draft.toml", toml)
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	runs, _, problems := ingest.Read(data, name, []*schemas.Schema{s})
	if len(runs) != report.Runs || len(problems) != len(report.Problems) {
		t.Errorf("%s: %d runs and %d problems, the report says %d and %d", name, len(runs), len(problems), report.Runs, len(report.Problems))
	}
	return runs, report
}

// Accepted unchanged, a draft reads the dumps of the shipped schemas as these
// do, or not at all. Source of the truth: the shipped schemas, written by hand.
func TestDraftsReadAsTheShippedSchemas(t *testing.T) {
	set := schemas.Shipped()
	right, refused := 0, 0
	check := func(path string, entry fs.DirEntry, err error) error {
		if err != nil || entry.IsDir() {
			return err
		}
		data, err := os.ReadFile(path)
		if err != nil {
			return err
		}
		want, schema, problems := ingest.Read(data, path, set)
		if schema == nil || len(problems) > 0 {
			return nil
		}
		got, report := readWithDraft(t, data, path)
		if len(report.Problems) > 0 {
			t.Logf("%s: %v", path, report.Problems[0])
			refused++
			return nil
		}
		if !slices.Equal(readings(got), readings(want)) {
			t.Errorf("%s:\ngot  %.300q\nwant %.300q", path, readings(got), readings(want))
			return nil
		}
		for i := range got {
			if !numbersAgree(&got[i], &want[i]) {
				t.Errorf("%s run %d: facts\n%+v %+v\n%+v %+v", path, i+1, got[i].Facts, got[i].Indicated, want[i].Facts, want[i].Indicated)
			}
		}
		right++
		return nil
	}
	for _, dir := range []string{"dialects", "tern-island/dumps"} {
		if err := filepath.WalkDir(filepath.Join(testdata, dir), check); err != nil {
			t.Fatal(err)
		}
	}
	t.Logf("%d dumps read rightly with their drafts, %d refused", right, refused)
	if right < 50 || 5*refused > right+refused {
		t.Errorf("%d dumps right, %d refused; want at least 80 %% right", right, refused)
	}
}
