package schemas

import (
	"os"
	"path/filepath"
	"testing"
)

// The schemas of the invented dialects, which state keys that no shipped one
// does, are valid for editors too.
func TestZooIsValidForEditors(t *testing.T) {
	schema := readEditorSchema(t)
	files, err := filepath.Glob("../testdata/dialects/*.toml")
	if err != nil || len(files) == 0 {
		t.Fatalf("%d schemas, %v", len(files), err)
	}
	for _, f := range files {
		src, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		for _, fault := range validate(schema, decoded(t, string(src)), "") {
			t.Errorf("%s: %s", f, fault)
		}
	}
}
