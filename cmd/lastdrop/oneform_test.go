package main

import (
	"bytes"
	"encoding/json"
	"math/big"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/xuri/excelize/v2"

	"lastdrop/cmd/internal/demo"
	"lastdrop/report"
	"lastdrop/report/figure"
	"lastdrop/report/lines"
	"lastdrop/report/pdf"
	"lastdrop/report/terminal"
	"lastdrop/report/xlsx"
)

// told are the figures of one endpoint as the terminal prints them.
type told struct {
	refit, u, low, high, indicated, difference, percent, limit string
	bracket                                                    [2]string
}

var (
	lookRefit      = regexp.MustCompile(`^  refit(?: \d+)? +(\S+) mL, .* u (\S+) mL$`)
	lookInterval   = regexp.MustCompile(`^    95 % +(\S+) to (\S+) mL`)
	lookIndicated  = regexp.MustCompile(`^  indicated(?: \d+)? +(\S+) mL`)
	lookDifference = regexp.MustCompile(`^    difference +(\S+) mL, (\S+) % of the refit; (\S+) mL allowed`)
	lookBracket    = regexp.MustCompile(`^    bracket +(\S+) mL .*to (\S+) mL`)
)

// lookedAt reads the figures of a run off the terminal.
func lookedAt(t *testing.T, e *report.Evaluation) (all []told) {
	t.Helper()
	var b bytes.Buffer
	if err := terminal.Look(&b, []report.Evaluation{*e}, nil, terminal.Options{Width: 160}); err != nil {
		t.Fatal(err)
	}
	for _, l := range strings.Split(b.String(), "\n") {
		if m := lookRefit.FindStringSubmatch(l); m != nil {
			all = append(all, told{refit: m[1], u: m[2]})
		}
		if len(all) == 0 {
			continue
		}
		last := &all[len(all)-1]
		if m := lookInterval.FindStringSubmatch(l); m != nil {
			last.low, last.high = m[1], m[2]
		} else if m := lookIndicated.FindStringSubmatch(l); m != nil {
			last.indicated = m[1]
		} else if m := lookDifference.FindStringSubmatch(l); m != nil {
			last.difference, last.percent, last.limit = m[1], m[2], m[3]
		} else if m := lookBracket.FindStringSubmatch(l); m != nil {
			last.bracket = [2]string{m[1], m[2]}
		}
	}
	return all
}

// roundsTo tells whether a number of the record, rounded to the decimals that
// a text has, is that text; half of the last place is given either way for a
// tie.
func roundsTo(text string, v float64) bool {
	plain := strings.TrimPrefix(strings.Replace(text, "−", "-", 1), "+")
	printed, err := strconv.ParseFloat(plain, 64)
	if err != nil {
		return false
	}
	_, fraction, _ := strings.Cut(plain, ".")
	half := 0.5000001
	for range fraction {
		half /= 10
	}
	return v-printed <= half && printed-v <= half
}

// TestOneFigureOneForm walks a demonstration night: what the terminal prints
// of an endpoint is what the record holds, and the same text stands on the
// run's page, in the list of the front page, in the workbook and in the mail.
func TestOneFigureOneForm(t *testing.T) {
	n := sweepDemonstration(t, demo.DefaultSeed).Night
	w := &walk{T: t, night: n, page: map[string][]string{}}
	w.readPages()
	w.readWorkbook()
	records := w.records()
	endpoints := 0
	for i := range n.Evaluations {
		e := &n.Evaluations[i]
		all := lookedAt(t, e)
		if len(all) != len(e.Endpoints) {
			t.Errorf("%s: look shows %d endpoints, want %d", e.ID, len(all), len(e.Endpoints))
			continue
		}
		for k := range all {
			w.record(&records[i], k, all[k])
			w.pageOf(e, all[k])
			w.rowOf(e, k, all[k])
			endpoints++
		}
		w.sentences(e, all)
		w.frontRow(e, all)
	}
	w.mail()
	if endpoints < 70 {
		t.Errorf("only %d endpoints were walked", endpoints)
	}
}

// walk holds what was published of a night.
type walk struct {
	*testing.T
	night *report.Night
	page  map[string][]string // texts of the pages of a run, by its id
	front []string            // texts of the front pages
	rows  map[string]map[string]string
}

func (w *walk) readPages() {
	book, err := pdf.Plan(w.night, pdf.Options{Pages: "all"})
	if err != nil {
		w.Fatal(err)
	}
	book.Draw(func(p pdf.Drawn) {
		for _, b := range p.Sheet.Boxes {
			if b.Kind != figure.AText {
				continue
			}
			if id, _, isRun := strings.Cut(strings.TrimPrefix(p.What, "run "), " of "); isRun {
				w.page[id] = append(w.page[id], b.Name)
			} else if p.What == "front page" {
				w.front = append(w.front, b.Name)
			}
		}
	})
}

// readWorkbook reads the rows of endpoints as an office program shows them.
func (w *walk) readWorkbook() {
	var b bytes.Buffer
	if err := xlsx.Write(&b, w.night, xlsx.Options{}); err != nil {
		w.Fatal(err)
	}
	f, err := excelize.OpenReader(&b, excelize.Options{RawCellValue: true})
	if err != nil {
		w.Fatal(err)
	}
	defer f.Close()
	all, err := f.GetRows("Endpoints")
	if err != nil {
		w.Fatal(err)
	}
	w.rows = map[string]map[string]string{}
	for k, row := range all[1:] {
		r := map[string]string{}
		for i, v := range row {
			r[all[0][i]] = w.shown(f, i+1, k+2, v)
		}
		w.rows[r["id"]+" "+r["endpoint"]] = r
	}
}

// shown is a cell as its number format shows it: exact decimal arithmetic,
// half away from zero as office programs do (from memory).
func (w *walk) shown(f *excelize.File, column, row int, raw string) string {
	name, err := excelize.CoordinatesToCellName(column, row)
	if err != nil {
		w.Fatal(err)
	}
	id, err := f.GetCellStyle("Endpoints", name)
	if err != nil {
		w.Fatal(err)
	}
	style, err := f.GetStyle(id)
	if err != nil {
		w.Fatal(err)
	}
	v, isNumber := new(big.Rat).SetString(raw)
	if style.CustomNumFmt == nil || !isNumber {
		return raw
	}
	sections := strings.Split(strings.ReplaceAll(*style.CustomNumFmt, `"`, ""), ";")
	format := sections[0]
	if v.Sign() < 0 && len(sections) > 1 {
		format = sections[1]
	} else if v.Sign() == 0 && len(sections) > 2 {
		format = sections[2]
	}
	_, decimals, _ := strings.Cut(format, ".")
	return strings.TrimRight(format, "0.") + v.Abs(v).FloatString(len(decimals))
}

// records are the evaluations as another program reads them.
func (w *walk) records() []report.Evaluation {
	var b bytes.Buffer
	if err := lines.Evaluations(&b, w.night.Evaluations); err != nil {
		w.Fatal(err)
	}
	var all []report.Evaluation
	for from := json.NewDecoder(&b); from.More(); {
		var e report.Evaluation
		if err := from.Decode(&e); err != nil {
			w.Fatal(err)
		}
		all = append(all, e)
	}
	return all
}

func (w *walk) record(e *report.Evaluation, k int, is told) {
	p := &e.Endpoints[k]
	want := map[string]float64{is.refit: p.VolumeML, is.u: p.UML, is.low: p.Low95ML, is.high: p.High95ML, is.bracket[0]: p.BracketML[0], is.bracket[1]: p.BracketML[1]}
	if d := p.Differs; d != nil {
		want[is.difference], want[is.percent], want[is.limit], want[is.indicated] = d.ML, d.Percent, d.LimitML, d.IndicatedML
	}
	for text, v := range want {
		if !roundsTo(text, v) {
			w.Errorf("%s, endpoint %d: printed %q, the record holds %v", e.ID, k+1, text, v)
		}
	}
}

// pageOf: the texts of the run's page hold each figure as a word of its own.
func (w *walk) pageOf(e *report.Evaluation, is told) {
	all := " " + strings.Join(w.page[e.ID], " ") + " "
	want := []string{is.refit, is.low + " to " + is.high}
	if is.indicated != "" {
		want = append(want, is.indicated)
	}
	if is.difference != "" {
		want = append(want, is.difference, is.percent+" %", is.limit)
	}
	for _, text := range want {
		if !strings.Contains(all, " "+text+" ") && !strings.Contains(all, " "+text+"; ") {
			w.Errorf("page of %s: no %q", e.ID, text)
		}
	}
	for _, text := range w.page[e.ID] {
		if strings.HasPrefix(text, "bracket ") && len(e.Endpoints) == 1 && text != "bracket "+is.bracket[0]+" to "+is.bracket[1]+" mL" {
			w.Errorf("page of %s: %q, want %s to %s", e.ID, text, is.bracket[0], is.bracket[1])
		}
	}
}

func (w *walk) rowOf(e *report.Evaluation, k int, is told) {
	r := w.rows[e.ID+" "+strconv.Itoa(k+1)]
	for head, want := range map[string]string{
		"refit (mL)": is.refit, "u, readings only (mL)": is.u, "95 % low, readings only (mL)": is.low, "95 % high, readings only (mL)": is.high,
		"indicated (mL)": is.indicated, "difference, refit − indicated (mL)": is.difference, "difference (% of refit)": is.percent,
		"agreement limit (mL)": is.limit, "bracket low (mL)": is.bracket[0], "bracket high (mL)": is.bracket[1],
	} {
		if r[head] != want {
			w.Errorf("workbook, %s, endpoint %d, %s: %q, want %q", e.ID, k+1, head, r[head], want)
		}
	}
}

var (
	saysRefit      = regexp.MustCompile(`[Rr]efit (\S+) mL`)
	saysIndicated  = regexp.MustCompile(`(?:^|[^−] )indicated (?:endpoint )?(\S+) mL`)
	saysDifference = regexp.MustCompile(`(?:refit − indicated|difference) (\S+) mL`)
)

// sentences: what flags say in figures are the figures.
func (w *walk) sentences(e *report.Evaluation, all []told) {
	for _, f := range e.Flags {
		if f.Flag == "exported-again" { // tells what another dump says
			continue
		}
		w.inWords(e.ID+", "+f.Flag, f.Says, all)
	}
}

// inWords compares the figures in a text with those of a run, and returns how
// many there are.
func (w *walk) inWords(where, text string, all []told) (found int) {
	for _, c := range []struct {
		is   *regexp.Regexp
		have func(told) string
	}{{saysRefit, func(o told) string { return o.refit }}, {saysIndicated, func(o told) string { return o.indicated }}, {saysDifference, func(o told) string { return o.difference }}} {
		for _, m := range c.is.FindAllStringSubmatch(text, -1) {
			found++
			if len(all) > 0 && !slices.ContainsFunc(all, func(o told) bool { return c.have(o) == m[1] }) {
				w.Errorf("%s: %q is not what the terminal prints", where, m[0])
			}
		}
	}
	return found
}

// frontRow: the list of the front page has one of the run's differences in %.
func (w *walk) frontRow(e *report.Evaluation, all []told) {
	at := slices.Index(w.front, e.ID)
	if e.Verdict == report.VerdictSound || !slices.ContainsFunc(all, func(o told) bool { return o.percent != "" }) {
		return
	}
	if at < 0 {
		w.Errorf("%s is not on the front page", e.ID)
		return
	}
	row := w.front[at:]
	for i, text := range row {
		if strings.HasPrefix(text, "page ") {
			row = row[:i]
			break
		}
	}
	if !slices.ContainsFunc(all, func(o told) bool { return slices.Contains(row, o.percent) }) {
		w.Errorf("front page, %s: none of its differences in %q", e.ID, row)
	}
}

// mail: each run of the mail is told with the figures of the terminal.
func (w *walk) mail() {
	var b bytes.Buffer
	if err := terminal.Summary(&b, w.night, terminal.SummaryOptions{}); err != nil {
		w.Fatal(err)
	}
	found := 0
	for _, part := range strings.Split(b.String(), "\n\n") {
		for i := range w.night.Evaluations {
			e := &w.night.Evaluations[i]
			if strings.HasSuffix(strings.TrimSpace(part), ", id "+e.ID) && e.Heaviest().Flag != "exported-again" {
				found += w.inWords("mail, "+e.ID, strings.Join(strings.Fields(part), " "), lookedAt(w.T, e))
			}
		}
	}
	if found < 15 {
		w.Errorf("only %d figures in the mail", found)
	}
}
