package xlsx

import (
	"math"
	"strings"

	"github.com/xuri/excelize/v2"

	"lastdrop/report"
)

// The workbook keeps the inks of the pages: black is what the instrument
// wrote, blue is what lastdrop computed, warm speaks against.
const (
	ink    = "17191C"
	second = "575A5F"
	blue   = "0072B2"
	warm   = "D55E00"
	band   = "EFECE4"
	blush  = "F4D5BF" // behind "disputed": the warm of the pages, a quarter of it
	amber  = "FBE8BF" // behind "doubtful": the amber of the pages, a quarter of it
)

const font = "Arial" // has the marks, and every office program has it or its twin

// look is how a cell is shown. Looks are compared, so that each has one style
// in the file.
type look struct {
	colour   string
	fill     string
	size     float64
	bold     bool
	italic   bool
	wrap     bool
	link     bool
	head     bool // head of a table: rule below, at the bottom
	right    bool
	number   bool
	decimals int
	sign     sign
}

// sign is which signs a number shows.
type sign int

const (
	minusOnly sign = iota
	plusToo        // of a difference
	noSign         // of a negative number that is shown as zero: never "−0.00"
)

const textSize = 10

func plain() look               { return look{colour: ink, size: textSize} }
func (l look) in(c string) look { l.colour = c; return l }
func (l look) wrapped() look    { l.wrap = true; return l }
func (l look) strong() look     { l.bold = true; return l }

// style returns the number of the style that shows l.
func (b *book) style(l look) (int, error) {
	if id, known := b.styles[l]; known {
		return id, nil
	}
	id, err := b.file.NewStyle(l.style())
	if err != nil {
		return 0, err
	}
	if !l.number {
		// The text stays text when somebody edits the cell or saves it as CSV.
		quote := true
		b.file.Styles.CellXfs.Xf[id].QuotePrefix = &quote
	}
	b.styles[l] = id
	return id, nil
}

func (l look) style() *excelize.Style {
	s := &excelize.Style{
		Font:      &excelize.Font{Family: font, Size: l.size, Color: l.colour, Bold: l.bold, Italic: l.italic},
		Alignment: &excelize.Alignment{Horizontal: "left", Indent: 1, Vertical: "top", WrapText: l.wrap},
	}
	if l.number || l.right {
		s.Alignment.Horizontal = "right"
	}
	if l.number {
		f := l.format()
		s.CustomNumFmt = &f
	} else {
		s.NumFmt = 49 // "@", text
	}
	if l.link {
		s.Font.Underline = "single"
	}
	if l.fill != "" {
		s.Fill = excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{l.fill}}
	}
	if l.head {
		s.Border = []excelize.Border{{Type: "bottom", Color: ink, Style: 1}}
	}
	return s
}

// format has a true minus sign, as on the pages, and so many decimals; the
// cell keeps the whole number.
func (l look) format() string {
	f := "0"
	if l.decimals > 0 {
		f += "." + "000000000"[:min(l.decimals, 9)]
	}
	switch l.sign {
	case noSign:
		return f + ";" + f
	case plusToo:
		return `"+"` + f + `;"` + report.Minus + `"` + f + ";" + f
	}
	return f + `;"` + report.Minus + `"` + f
}

// verdictLook tells a verdict by weight of type and tint beside mark and word.
func verdictLook(v report.Verdict) look {
	switch v {
	case report.VerdictDisputed:
		return look{colour: ink, size: textSize, bold: true, fill: blush}
	case report.VerdictDoubtful:
		return look{colour: ink, size: textSize, fill: amber}
	}
	return look{colour: second, size: textSize}
}

// verdictMark is the mark before a verdict's word: it gains ink with urgency.
func verdictMark(v report.Verdict) string {
	switch v {
	case report.VerdictDisputed:
		return "■"
	case report.VerdictDoubtful:
		return "◆"
	}
	return "○"
}

const unreadMark = "□"

func verdictCell(v report.Verdict) cell {
	return cell{verdictMark(v) + " " + string(v), verdictLook(v)}
}

// weightCell shows the weight of one flag in the same way.
func weightCell(w report.Weight) cell {
	if w == report.Note {
		return cell{"○ note", verdictLook(report.VerdictSound)}
	}
	return verdictCell(report.Verdict(w))
}

func text(s string) cell {
	if s == "" {
		return cell{}
	}
	return cell{s, plain()}
}

func wrapped(s string) cell {
	if s == "" {
		return cell{}
	}
	return cell{s, plain().wrapped()}
}

// number shows v with so many decimals in the ink of whoever it comes from.
func number(v float64, decimals int, colour string) cell {
	l := look{colour: colour, size: textSize, number: true, decimals: decimals}
	if v < 0 && !strings.HasPrefix(report.Fixed(v, decimals), report.Minus) {
		l.sign = noSign
	}
	return cell{v, l}
}

// signed is number with a plus sign where report.Signed prints one.
func signed(v float64, decimals int, colour string) cell {
	c := number(v, decimals, colour)
	if s := report.Signed(v, decimals); strings.HasPrefix(s, "+") || strings.HasPrefix(s, report.Minus) {
		c.look.sign = plusToo
	} else {
		c.look.sign = noSign
	}
	return c
}

func count(v int) cell { return cell{v, look{colour: ink, size: textSize, number: true}} }

// countIf leaves 0 out where it means "none known".
func countIf(v int) cell {
	if v == 0 {
		return cell{}
	}
	return count(v)
}

// optional leaves an absent figure empty, so that filters and sums work.
func optional(v *float64, colour string) cell {
	if v == nil {
		return cell{}
	}
	return number(*v, asStated(*v), colour)
}

// figure shows what a flag measured, or its limit: three figures, without
// zeros that say nothing.
func figure(v float64) cell { return number(v, min(threeFigures(v), asStated(v)), ink) }

// threeFigures is how many decimals show three figures of v, at most 6.
func threeFigures(v float64) int {
	if v == 0 || math.IsNaN(v) || math.IsInf(v, 0) {
		return 0
	}
	return min(max(2-int(math.Floor(math.Log10(math.Abs(v)))), 0), 6)
}

// link is text that leads somewhere.
func link(s string) cell {
	l := plain().in(blue)
	l.link = true
	return cell{s, l}
}

// asStated shows a fact or a limit with the decimals that it is stated with,
// at most 6: none that nobody wrote.
func asStated(v float64) int {
	for d := 0; d < 6; d++ {
		if scaled := math.Abs(v) * math.Pow10(d); math.Abs(scaled-math.Round(scaled)) < 1e-9*max(scaled, 1) {
			return d
		}
	}
	return 6
}
