// Package demo writes the demonstration laboratory: Tern Island Preserves, an
// invented maker of pickles and vinegar, with about sixty dumps of one night
// from three invented instruments. Curves come from fit/simulate, so the truth
// of every run is known; faults of real life are planted in known places, and
// a README and truth.csv beside the dumps tell all of them.
//
// It computes no endpoint of its own and reads no dump. Same seed, same bytes.
package demo

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
)

// DefaultSeed is the seed of the laboratory that stands in
// testdata/tern-island. Any other gives the same faults in the same places
// with other samples and other noise.
const DefaultSeed uint64 = 20310402

// File is one file of the laboratory. Path has slashes and is relative to its
// folder: "dumps/bench-a/0417.csv".
type File struct {
	Path string
	Data []byte
}

// Files returns the whole laboratory in memory, and what is true of each run
// in it, in the order of the night. Every seed gives a laboratory; an error is
// a mistake in this package.
func Files(seed uint64) ([]File, []Planted, error) {
	n, err := newNight(seed)
	if err != nil {
		return nil, nil, err
	}
	files := append([]File(nil), n.files...)
	files = append(files, File{"README.md", readme(n)}, File{"truth.csv", truthTable(n.planted)})
	return files, n.planted, nil
}

// Write writes the laboratory into dir, which is made if it does not exist. It
// returns an error, and writes nothing, when dir holds anything already.
func Write(dir string, seed uint64) error {
	entries, err := os.ReadDir(dir)
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	if len(entries) > 0 {
		return fmt.Errorf("%s: the folder is not empty; name a new folder, the demonstration overwrites nothing", dir)
	}
	files, _, err := Files(seed)
	if err != nil {
		return err
	}
	for _, f := range files {
		path := filepath.Join(dir, filepath.FromSlash(f.Path))
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			return err
		}
		if err := os.WriteFile(path, f.Data, 0o644); err != nil {
			return err
		}
	}
	return nil
}
