package night

import (
	"bytes"
	"context"
	"io"
	"io/fs"
	"strings"

	"lastdrop/ingest/archive"
	"lastdrop/report"
)

// unpack reads and refits the dumps in an archive, one after the other as they
// are unpacked. An archive that is too young or changes while it is read waits
// as a whole.
func (d dump) unpack(ctx context.Context, o Options) yield {
	before, err := fs.Stat(d.files, d.path)
	if err != nil {
		return d.alone(d.unread(err))
	}
	if waits := tooYoung(before, o); waits != "" {
		return d.alone(nil, waits, nil)
	}
	f, err := d.files.Open(d.path)
	if err != nil {
		return d.alone(d.unread(err))
	}
	defer f.Close() // opened for reading: nothing to lose
	r, ok := f.(io.ReaderAt)
	if !ok {
		data, err := io.ReadAll(io.LimitReader(f, maxDumpBytes))
		if err != nil {
			return d.alone(d.unread(err))
		}
		r = bytes.NewReader(data)
	}
	y := d.members(ctx, r, before.Size(), o)
	switch after, err := fs.Stat(d.files, d.path); {
	case err != nil:
		return d.alone(d.unread(err))
	case after.Size() != before.Size() || !after.ModTime().Equal(before.ModTime()):
		return d.alone(nil, changedMeanwhile, nil)
	}
	return y
}

// alone is what an archive gives that is not opened.
func (d dump) alone(_ []byte, waits string, problem *report.Unread) yield {
	out := outcome{dump: d, waits: waits}
	if problem != nil {
		out.unread = stampedUnread([]report.Unread{*problem}, d.name, "")
	}
	return yield{outcomes: []outcome{out}}
}

// members refits every dump of the archive.
func (d dump) members(ctx context.Context, r io.ReaderAt, size int64, o Options) (y yield) {
	hidden, seen := 0, map[string]bool{}
	keep := func(member string) bool {
		name := d.name + "/" + MemberName(member)
		switch {
		case isHidden(MemberName(member)):
			hidden++
			return false
		case !IsDump(name):
			y.names = append(y.names, name)
			return false
		case o.excludes(name):
			y.names = append(y.names, name)
			y.excluded++
			return false
		}
		return true
	}
	skipped, problems := archive.Read(r, size, d.name, o.unpackLimits(), keep, func(m archive.Member) bool {
		out := outcome{dump: dump{name: m.Name}}
		if seen[m.Name] {
			out.unread = stampedUnread([]report.Unread{{Says: "the archive holds this name twice; only the first one is read",
				Hint: "unpack it by hand and look at both"}}, m.Name, sha(m.Data))
		} else {
			out.refit(m.Data, o)
		}
		seen[m.Name] = true
		y.outcomes = append(y.outcomes, out)
		return ctx.Err() == nil
	})
	for _, p := range problems {
		out := outcome{dump: dump{name: p.Path}}
		out.unread = stampedUnread([]report.Unread{{Says: p.Msg, Hint: p.Hint}}, p.Path, "")
		y.outcomes = append(y.outcomes, out)
	}
	y.others = skipped - hidden - y.excluded
	if len(y.outcomes) == 0 && skipped == 0 {
		y.others = 1 // the archive itself
	}
	return y
}

// isHidden is true for a member that a folder would hide.
func isHidden(member string) bool {
	for name := range strings.SplitSeq(member, "/") {
		if strings.HasPrefix(name, ".") {
			return true
		}
	}
	return false
}

func (o *Options) unpackLimits() archive.Limits {
	if o.Unpack == (archive.Limits{}) {
		return archive.Default()
	}
	return o.Unpack
}
