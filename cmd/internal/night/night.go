// Package night is the sweep: folders of dumps become one published night.
// Its stages stand in a file each, in the order of Sweep:
//
//	own.go       whether OUT is ours
//	folders.go   which folders and files, under which names, and where OUT may lie
//	discover.go  which files are dumps (patterns.go: which of them are wanted)
//	evaluate.go  dump by dump: wait, read (read.go), refit, identify (identity.go);
//	             unpack.go does so with the dumps of an archive
//	join.go      the same run under two names; exported.go and twins.go say where such runs differ
//	assemble.go  order, verdicts, the night; gaps.go the run numbers that are missing
//	publish/     every file or none
//
// It computes no endpoint (package refit does) and lays nothing out (package
// report does). A dump is opened for reading and nothing else. No clock is
// read but through Options.Now, and nothing published depends on it.
package night

import (
	"context"
	"io"
	"log/slog"
	"os"
	"path/filepath"
	"slices"
	"sort"
	"strings"
	"time"

	"lastdrop/cmd/internal/night/publish"
	"lastdrop/ingest/archive"
	"lastdrop/report"
)

// Refit turns the bytes of one dump into evaluations; see package refit. It
// is called from several goroutines at once.
type Refit func(data []byte, name, sha string) ([]report.Evaluation, []report.Unread)

// Output is one published file and how it is laid out.
type Output struct {
	Name  string
	Write func(io.Writer, *report.Night) error
}

// Options are all that a sweep depends on.
type Options struct {
	Folders    []string         // folders and single dumps as the user named them, at least one
	Include    []Pattern        // only dumps that one of them matches; none takes all
	Exclude    []Pattern        // no dump that one of them matches
	Unpack     archive.Limits   // of each archive; zero for archive.Default
	Into       string           // OUT; made when missing
	MinAge     time.Duration    // younger dumps wait; 0 takes every dump
	Now        func() time.Time // for the age of dumps only
	Date       string           // of the publication, 2031-04-03
	Workers    int              // dumps refitted at once; 0 for as many as there are processors
	Laboratory string
	Estimator  string // what was asked for by name, for the pages that print it
	Lastdrop   string // program version
	Limits     []report.Limit
	Origins    map[string]string // where a schema comes from, by its SHA-256
	Refit      Refit
	Log        *slog.Logger // warnings

	// Outputs are the files of a night, in the order in which they are put in
	// place: those that a person may hold open first; nil for none.
	Outputs func(*report.Night) ([]Output, error)
	// Own tells whether a file of OUT, by its name, is one of a night's. An
	// earlier night's goes when this night does not have it; one that stands
	// where no sweep has been is somebody's work. Nil for none.
	Own func(name string) bool
}

// Result is a published night.
type Result struct {
	Night *report.Night
	Dumps int      // dumps found: read, unread and waiting
	Files []string // what was published, each with OUT before it, in byte order

	folders map[string]string // path of each swept folder, by its name
}

// Path returns where a dump of the night lies, as the user named its folder.
// It belongs into messages and never into a published file.
func (r *Result) Path(dump string) string {
	name, below, _ := strings.Cut(dump, "/")
	return filepath.Join(r.folders[name], filepath.FromSlash(below))
}

// Sweep reads every dump of the folders and publishes one night into OUT.
// When it returns an error OUT is as it was, but that a first one leaves
// last-sweep.txt. The error is an *Error, or the context's cause when that
// ended the sweep.
func Sweep(ctx context.Context, o Options) (*Result, error) {
	if err := ours(o); err != nil {
		return nil, err
	}
	in, err := openFolders(o.Folders, o.Into)
	if err != nil {
		return nil, err
	}
	defer in.close()
	place, err := claim(o)
	if err != nil {
		return nil, err
	}
	defer place.Close() // what it cannot clean, the next Open does

	found, err := discover(ctx, in.all, &o)
	if err != nil {
		return nil, err
	}
	found.warn(o.Log)
	all, err := evaluate(ctx, found.dumps, o)
	if err != nil {
		return nil, err
	}
	if len(all.outcomes) == 0 {
		return nil, found.nothing(found.others+all.others, found.excluded+all.excluded)
	}
	result := &Result{Night: assemble(found, &all, o), Dumps: len(all.outcomes), folders: map[string]string{}}
	for _, f := range in.all {
		result.folders[f.name] = f.path
	}
	if err := put(ctx, place, result, o); err != nil {
		return nil, err
	}
	return result, nil
}

// put publishes the night. After its last look at the context the files
// change place in one go.
func put(ctx context.Context, place *publish.Place, r *Result, o Options) error {
	var outputs []Output
	if o.Outputs != nil {
		var err error
		if outputs, err = o.Outputs(r.Night); err != nil {
			return unfinished(o, err)
		}
	}
	files := make([]publish.File, len(outputs))
	for i, out := range outputs {
		files[i] = publish.File{Name: out.Name, Write: func(w io.Writer) error { return out.Write(w, r.Night) }}
		r.Files = append(r.Files, filepath.Join(o.Into, out.Name))
	}
	sort.Strings(r.Files)
	gone, err := former(files, o)
	if err != nil {
		return unfinished(o, err)
	}
	err = place.Publish(ctx, files, gone)
	if err != nil && ctx.Err() != nil {
		return context.Cause(ctx)
	}
	if err != nil {
		return unfinished(o, err)
	}
	return nil
}

func unfinished(o Options, err error) error {
	return &Error{Kind: Unfinished, Msg: "nothing was published into " + o.Into, Err: err,
		Try: "make room, close files of " + o.Into + " that are open elsewhere, then sweep again"}
}

// former lists the files of an earlier night that this night does not have.
func former(files []publish.File, o Options) (gone []string, err error) {
	if o.Own == nil {
		return nil, nil
	}
	entries, err := os.ReadDir(o.Into)
	for _, e := range entries {
		has := slices.ContainsFunc(files, func(f publish.File) bool { return f.Name == e.Name() })
		if !has && e.Type().IsRegular() && o.Own(e.Name()) {
			gone = append(gone, e.Name())
		}
	}
	return gone, err
}
