package xlsx

import (
	"fmt"
	"strconv"
	"strings"

	"github.com/xuri/excelize/v2"

	"lastdrop/report"
)

// column is the head of one column of a table.
type column struct {
	title   string // with the unit
	width   float64
	colour  string // of the head: whose figures stand below
	figures bool   // the column holds numbers and aligns right
}

// layout is what a sheet is besides its cells. excelize loses most of it in
// silence when it comes later than the first row.
type layout struct {
	name      string
	columns   []column
	table     bool // row 1 is the head of one table: frozen, filtered, repeated on paper
	frozen    int  // columns that stay in sight beside the head
	pagesWide int
	rows      int // of the table below its head
	tab       string
}

// open begins the next sheet of the workbook; the first takes the place of
// the one that a new workbook has.
func (b *book) open(l layout, footer string) *sheet {
	s := &sheet{book: b, name: l.name, columns: l.columns}
	s.err = b.prepare(l, footer)
	if s.err != nil {
		return s
	}
	if s.stream, s.err = b.file.NewStreamWriter(l.name); s.err != nil {
		return s
	}
	if s.err = s.setWidths(l); s.err != nil || !l.table {
		return s
	}
	s.putHead(l)
	return s
}

// prepare makes the sheet and all that must be set before it is streamed.
func (b *book) prepare(l layout, footer string) error {
	if first := b.file.GetSheetName(0); first == "Sheet1" {
		if err := b.file.SetSheetName(first, l.name); err != nil {
			return err
		}
	} else if _, err := b.file.NewSheet(l.name); err != nil {
		return err
	}
	last, err := excelize.ColumnNumberToName(len(l.columns))
	if err != nil {
		return err
	}
	if l.table {
		err = b.setTable(l, last)
	} else {
		err = b.quietNumbers(l.name, last, 1<<16)
	}
	if err != nil {
		return err
	}
	// After the filter, which would undo it.
	fit, grid := true, l.table
	if err := b.file.SetSheetProps(l.name, &excelize.SheetPropsOptions{FitToPage: &fit, TabColorRGB: &l.tab}); err != nil {
		return err
	}
	if err := b.file.SetSheetView(l.name, 0, &excelize.ViewOptions{ShowGridLines: &grid}); err != nil {
		return err
	}
	return b.setPaper(l, footer)
}

// quietNumbers keeps "number stored as text" off sample names of digits.
func (b *book) quietNumbers(name, last string, rows int) error {
	return b.file.AddIgnoredErrors(name, "A1:"+last+strconv.Itoa(rows), excelize.IgnoredErrorsNumberStoredAsText)
}

// setTable filters the table and repeats its head and its frozen columns on
// every printed page.
func (b *book) setTable(l layout, last string) error {
	bottom := max(l.rows, 1) + 1
	if err := b.quietNumbers(l.name, last, bottom); err != nil {
		return err
	}
	if err := b.file.AutoFilter(l.name, "A1:"+last+strconv.Itoa(bottom), nil); err != nil {
		return err
	}
	repeat := "'" + l.name + "'!$1:$1"
	if l.frozen > 0 {
		edge, err := excelize.ColumnNumberToName(l.frozen)
		if err != nil {
			return err
		}
		repeat = "'" + l.name + "'!$A:$" + edge + "," + repeat
	}
	return b.file.SetDefinedName(&excelize.DefinedName{Name: "_xlnm.Print_Titles", RefersTo: repeat, Scope: l.name})
}

const a4 = 9 // paper size, ECMA-376 part 1, 18.3.1.63, from memory

func (b *book) setPaper(l layout, footer string) error {
	size, landscape, wide, high := a4, "landscape", max(l.pagesWide, 1), 0
	err := b.file.SetPageLayout(l.name, &excelize.PageLayoutOptions{Size: &size, Orientation: &landscape, FitToWidth: &wide, FitToHeight: &high})
	if err != nil {
		return err
	}
	side, top, edge := 0.5, 0.7, 0.3 // inches
	err = b.file.SetPageMargins(l.name, &excelize.PageLayoutMarginsOptions{Left: &side, Right: &side, Top: &top, Bottom: &top, Header: &edge, Footer: &edge})
	if err != nil {
		return err
	}
	return b.file.SetHeaderFooter(l.name, &excelize.HeaderFooterOptions{
		OddHeader: "&L&8lastdrop &A&R&8page &P of &N", OddFooter: "&L&8" + footer})
}

// footerText fits a printed footer: 255 characters, & doubled.
func footerText(invented bool) string {
	s := report.Caution
	if invented {
		s = report.InventedNote + " " + s
	}
	return strings.ReplaceAll(s, "&", "&&")
}

func (s *sheet) setWidths(l layout) error {
	for i, c := range l.columns {
		if err := s.stream.SetColWidth(i+1, i+1, c.width); err != nil {
			return err
		}
	}
	if !l.table {
		return nil
	}
	corner, err := excelize.CoordinatesToCellName(l.frozen+1, 2)
	if err != nil {
		return err
	}
	pane := "bottomRight"
	if l.frozen == 0 {
		pane = "bottomLeft"
	}
	return s.stream.SetPanes(&excelize.Panes{Freeze: true, XSplit: l.frozen, YSplit: 1, TopLeftCell: corner, ActivePane: pane,
		Selection: []excelize.Selection{{SQRef: corner, ActiveCell: corner, Pane: pane}}})
}

// arrowHeight is the room of a filter's arrow below the words of a head, in
// points.
const arrowHeight = 15

func (s *sheet) putHead(l layout) {
	cells := make([]cell, len(l.columns))
	for i, c := range l.columns {
		look := plain().strong().wrapped().in(c.colour)
		look.head, look.fill, look.right = true, band, c.figures
		cells[i] = cell{c.title, look}
	}
	s.put(max(s.heightOf(cells), lineHeight)+arrowHeight, cells...)
}

// linkTo makes a cell of the row that comes next lead to a cell of another
// sheet. Links beyond the first linksMost of a sheet are left out: each costs
// a search through those before it.
func (s *sheet) linkTo(column int, target, tip string) {
	if s.err != nil {
		return
	}
	name, err := excelize.CoordinatesToCellName(column, s.row+1)
	if err != nil {
		s.err = err
		return
	}
	s.err = s.book.file.SetCellHyperLink(s.name, name, target, "Location", excelize.HyperlinkOpts{Tooltip: &tip})
}

const linksMost = 2000

// finish ends the sheet; nothing may be set after it.
func (s *sheet) finish() error {
	if s.err == nil {
		s.err = s.stream.Flush()
	}
	if s.err != nil {
		return fmt.Errorf("sheet %s: %w", s.name, s.err)
	}
	return nil
}
