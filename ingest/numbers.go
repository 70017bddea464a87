package ingest

import (
	"bytes"
	"fmt"
	"math"

	"lastdrop/ingest/cells"
	"lastdrop/ingest/match"
	"lastdrop/ingest/plausible"
	"lastdrop/schemas"
)

// needed reads a volume or reading; without it the run is refused.
func (d *draft) needed(i int, s *steps) (v float64, ok bool) {
	at, f := d.row.Cells[i], d.columns.fields[i]
	b := d.scan.Bytes(at)
	n, fault := cells.ParseNumber(b, d.schema.Dialect.DecimalChar, f.Unit.Shift)
	v, l := n.Value*f.Unit.Times+f.Unit.Plus, d.columns.limits[i]
	if fault != cells.NumberOK || !l.Admits(v) || d.missing(b) {
		var why, hint string
		if n, v, why, hint = d.quantity(b, d.row.Line, &f.Written, l); why != "" {
			d.refuseRow(at.From, string(f.Role), why, hint)
			return 0, false
		}
	}
	s.see(n, f.Unit)
	if n.Decimals+f.Unit.Shift > 0 {
		d.decimalMarks++
	}
	return v, true
}

// delivered reads the volume of a row in which it is to be worked out: from
// increments, from empty cells, from a burette that was filled again. A text
// that means "not given" is no empty cell: a volume that failed is not "no
// titrant".
func (d *draft) delivered() (v float64, ok bool) {
	i := d.columns.volume
	at, f := d.row.Cells[i], d.columns.fields[i]
	if f.Empty == schemas.EmptySame && len(d.scan.Bytes(at)) == 0 {
		if !d.delivering && f.Role == schemas.RoleVolume {
			d.refuseRow(at.From, string(f.Role), "the cell is empty and no volume stands above", "the dump is damaged; export it again")
			return 0, false
		}
		if f.Role == schemas.RoleIncrement && !d.columns.dosesTold {
			d.undosed.see(d.row.Line)
		}
		return d.volume, true
	}
	v, ok = d.needed(i, &d.volumeSteps)
	if !ok {
		return 0, false
	}
	switch {
	case f.Role == schemas.RoleIncrement:
		v = d.rounded(d.volume + v)
	case f.Refills && d.delivering && v < d.shown:
		d.filled = d.volume
		d.repairs.Add(d.row.Line, fmt.Sprintf("volume begins anew at %s after %s, the burette was filled; it goes on from %s", plausible.Short(v), plausible.Short(d.shown), plausible.Short(d.filled)))
	}
	if f.Role == schemas.RoleVolume {
		d.shown = v
		v = d.rounded(d.filled + v)
	}
	if why := d.columns.limits[i].Breaks(v); why != "" {
		d.refuseRow(at.From, string(f.Role), why+" in sum", d.columns.limits[i].Hint)
		return 0, false
	}
	d.volume, d.delivering = v, true
	return v, true
}

// rounded is a sum of volumes without the rounding errors of its addition: the
// nearest number of the finest display seen.
func (d *draft) rounded(v float64) float64 {
	if n := d.volumeSteps.decimals; n >= 0 && n <= 12 {
		scale := math.Round(1 / cells.Step(n))
		return math.Round(v*scale) / scale
	}
	return v
}

// deliveredOnly takes the titrant of a row that is no reading. Where volumes
// stand for themselves in every row, those of such rows do not count.
func (d *draft) deliveredOnly(means string) {
	i := d.columns.volume
	f, empty := d.columns.fields[i], len(d.scan.Bytes(d.row.Cells[i])) == 0
	switch {
	case empty && means == schemas.StatusDose:
		d.refuseRow(d.row.Cells[i].From, string(f.Role), "the cell is empty in a row that delivers titrant", "the dump is damaged; export it again")
	case empty && (means == schemas.StatusSkip || f.Role == schemas.RoleVolume):
	case f.Role == schemas.RoleIncrement, f.Empty == schemas.EmptySame, f.Refills, means == schemas.StatusDose:
		d.delivered()
	}
}

// status says what the row is, by the column that tells it.
func (d *draft) status() string {
	i := d.columns.status
	if i < 0 {
		return schemas.StatusReading
	}
	at := d.row.Cells[i]
	b := d.scan.Bytes(at)
	for _, v := range d.columns.fields[i].Values {
		if !match.Equal(b, v.Text) && !(len(b) == 0 && v.Text == "") {
			continue
		}
		if v.Means == schemas.StatusTimedOut {
			d.timedOut.see(d.row.Line)
		}
		return v.Means
	}
	d.refuseRow(at.From, string(schemas.RoleStatus), cells.Quoted(b)+" is not known", fmt.Sprintf("state in values of schema %s what it means", d.schema.Name))
	return schemas.StatusSkip
}

// tally counts rows that are told in one repair line.
type tally struct{ rows, line int }

func (t *tally) see(line int) {
	if t.rows == 0 {
		t.line = line
	}
	t.rows++
}

// told tells the rows, counted, from the first of them on.
func (t *tally) told(d *draft, what, about string) {
	if t.rows > 0 {
		d.repairs.Add(t.line, fmt.Sprintf("%s from here on %s", plural(t.rows, what), about))
	}
}

// maxRemarks is how many remarks of one run are kept.
const maxRemarks = 200

// remarked keeps the remark of the row at hand.
func (d *draft) remarked() {
	i := d.columns.remark
	if i < 0 {
		return
	}
	b := d.scan.Bytes(d.row.Cells[i])
	if d.missing(b) {
		return
	}
	if len(d.remarks) == maxRemarks {
		d.repairs.Add(d.row.Line, fmt.Sprintf("more than %d remarks, not used", maxRemarks))
		return
	}
	if c := d.schema.Dialect.CommentChar; c != 0 && bytes.IndexByte(b, c) >= 0 {
		d.repairs.Add(d.row.Line, fmt.Sprintf("%q in a remark; it may be a line of its own", string(rune(c))))
	}
	if bytes.Contains(b, []byte("\ufeff")) || bytes.Contains(b, []byte("ï»¿")) {
		d.repairs.Add(d.row.Line, "a byte order mark in a remark; the dump may be joined of two")
	}
	text, _, _ := cells.Clean(b)
	d.remarks = append(d.remarks, Remark{d.row.Line, text})
}

// optional reads a time, temperature or drift; where one cannot be used the
// column is left out and the run says so.
func (d *draft) optional(column, which int) float64 {
	at, f := d.row.Cells[column], d.columns.fields[column]
	b := d.scan.Bytes(at)
	var v float64
	var why string
	if f.Clock.Text() != "" {
		v, why = d.clock(b, f)
	} else {
		_, v, why, _ = d.quantity(b, d.row.Line, &f.Written, d.columns.limits[column])
	}
	if which == timeColumn && why == "" {
		if d.count > 0 && v < d.lastTimeS {
			why = fmt.Sprintf("%v s after %v s, time runs backwards", v, d.lastTimeS)
			d.checkBackwards(column, why)
		}
		d.lastTimeS = v
	}
	if why != "" {
		d.lost[which] = true
		d.repairs.Add(d.row.Line, fmt.Sprintf("%s: %s; the column is not used", f.Role, why))
	}
	return v
}

const daySeconds = 24 * 3600

// clock reads a time as a clock shows it, in seconds since the first row. A
// clock without date that goes back by more than half a day has passed
// midnight.
func (d *draft) clock(b []byte, f *schemas.Field) (v float64, why string) {
	if d.missing(b) {
		return 0, notGiven(b)
	}
	v, err := cells.ParseClock(string(b), f.Clock)
	switch {
	case err != nil:
		return 0, cells.Quoted(b) + " " + err.Error()
	case !f.Clock.Has("HI"):
		return v, ""
	case d.count == 0:
		d.clockZero = v
	}
	v -= d.clockZero
	if !f.Clock.Has("Yy") {
		for v < d.lastTimeS-daySeconds/2 && d.count > 0 {
			v += daySeconds
		}
	}
	return v, ""
}

// quantity reads a number of a unit and holds it against its limit. why is ""
// when it can be used.
func (d *draft) quantity(b []byte, line int, w *schemas.Written, l *plausible.Limit) (n cells.Number, v float64, why, hint string) {
	if d.missing(b) {
		return n, 0, notGiven(b), "the dump is damaged or the reading failed; export it again"
	}
	n, bound, fault := cells.ParseWritten(b, &d.schema.Dialect, w)
	if fault != cells.NumberOK {
		why, hint = d.notNumber(b, fault)
		return n, 0, why, hint
	}
	if bound {
		d.repairs.Add(line, cells.Quoted(b)+" is a bound, taken as the number")
	}
	v = n.Value
	if w.Unit.Times != 1 {
		v *= w.Unit.Times
	}
	v += w.Unit.Plus
	if why = l.Breaks(v); why != "" {
		return n, 0, why, l.Hint
	}
	return n, v, "", ""
}

// notGiven says what stands in a cell whose text means "not given".
func notGiven(b []byte) string {
	if len(b) == 0 {
		return "the cell is empty"
	}
	return cells.Quoted(b) + " means that nothing is given"
}

// missing reports whether a text means "not given".
func (d *draft) missing(b []byte) bool {
	if len(b) == 0 {
		return true
	}
	for _, m := range d.schema.Dialect.MissingValues {
		if string(b) == m {
			return true
		}
	}
	return false
}

func (d *draft) notNumber(b []byte, fault cells.NumberFault) (why, hint string) {
	why = cells.Quoted(b) + " is not a number"
	switch {
	case match.FieldOf(d.schema, b) != nil:
		return cells.Quoted(b) + " is the header again", "two exports in one file? export each by itself"
	case fault == cells.NumberBound:
		return cells.Quoted(b) + " is a bound and no number", "state bounds = true in the schema where the number itself may be taken"
	case fault == cells.NumberUnbounded:
		return cells.Quoted(b) + " is too large", "the cell is damaged; export the dump again"
	case fault == cells.OtherMark && d.decimalMarks > 0:
		return why, fmt.Sprintf("other numbers of the run have the decimal mark %q; export the dump again", string(d.schema.Dialect.DecimalChar))
	case fault == cells.OtherMark && d.schema.Dialect.DecimalChar == '.':
		return why, `set decimalChar = "," in the schema`
	case fault == cells.OtherMark:
		return why, `set decimalChar = "." in the schema`
	}
	return why, "a plain decimal number is expected; the cell is damaged or the column is another one"
}
