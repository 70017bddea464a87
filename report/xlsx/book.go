package xlsx

import (
	"fmt"
	"io"
	"math"
	"sort"
	"strconv"
	"time"
	"unicode/utf16"

	"github.com/xuri/excelize/v2"

	"lastdrop/report"
)

// book keeps the guards around excelize in one place: numbers are rounded to
// the 15 digits that it would cut, text is cleaned and never a formula, a
// NaN never gets in, and the same night gives the same bytes.
type book struct {
	file   *excelize.File
	styles map[look]int
}

// cell is a value (string, float64, int or nil for empty) and its look.
type cell struct {
	value any
	look  look
}

func newBook(title, date, program string) (*book, error) {
	day, err := time.Parse(time.DateOnly, date)
	if err != nil {
		return nil, fmt.Errorf("date of the night: %q is no day; write it as 2031-04-03", date)
	}
	b := &book{file: excelize.NewFile(), styles: map[look]int{}}
	b.file.SetZipWriter(newSortedZip)
	if err := b.file.SetDefaultFont(font); err != nil {
		return nil, err
	}
	*b.file.Styles.Fonts.Font[0].Sz.Val = textSize // widths of columns count its digits
	stamp := day.Format(time.RFC3339)
	err = b.file.SetDocProps(&excelize.DocProperties{Title: title, Creator: program, LastModifiedBy: program,
		Created: stamp, Modified: stamp, Language: "en"})
	if err != nil {
		return nil, err
	}
	return b, b.file.SetAppProps(&excelize.AppProperties{Application: "lastdrop"})
}

// write hands the finished workbook over.
func (b *book) write(w io.Writer) error {
	types := b.file.ContentTypes.Defaults
	sort.Slice(types, func(i, j int) bool { return types[i].Extension < types[j].Extension })
	_, err := b.file.WriteTo(w)
	return err
}

// sheet writes rows from the top. The first error stays; later calls do
// nothing, so that only finish is asked.
type sheet struct {
	book    *book
	name    string
	stream  *excelize.StreamWriter
	row     int // the last one written
	values  []any
	columns []column
	err     error
}

// put writes one row. A height of 0 fits the text: the height is written when
// some cell needs more than one line, because not every reader finds it out.
func (s *sheet) put(height float64, cells ...cell) {
	s.row++
	if s.err != nil {
		return
	}
	s.values = s.values[:0]
	for i, c := range cells {
		v, err := s.checked(i, c)
		if err != nil {
			s.err = err
			return
		}
		s.values = append(s.values, v)
	}
	var o []excelize.RowOpts
	if height == 0 {
		height = s.heightOf(cells)
	}
	if height > 0 {
		o = []excelize.RowOpts{{Height: height}}
	}
	s.err = s.stream.SetRow("A"+strconv.Itoa(s.row), s.values, o...)
}

// skip leaves rows empty.
func (s *sheet) skip(rows int) { s.row += rows }

func (s *sheet) checked(column int, c cell) (any, error) {
	if c.value == nil && c.look == (look{}) {
		return nil, nil
	}
	id, err := s.book.style(c.look)
	if err != nil {
		return nil, err
	}
	value := c.value
	switch v := c.value.(type) {
	case float64:
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return nil, s.noNumber(column, v)
		}
		value = round15(v)
	case string:
		value = cut(report.Visible(v))
	}
	return excelize.Cell{StyleID: id, Value: value}, nil
}

// noNumber refuses what excelize would write as the text "NaN".
func (s *sheet) noNumber(column int, v float64) error {
	name, err := excelize.CoordinatesToCellName(column+1, s.row)
	if err != nil {
		return err
	}
	field := ""
	if column < len(s.columns) && s.columns[column].title != "" {
		field = ": " + s.columns[column].title
	}
	return fmt.Errorf("%s%s: %v is no number; the figure must be left out or mended before it is published", name, field, v)
}

// round15 rounds to 15 significant digits, as many as a workbook keeps;
// excelize would cut there. Minus zero becomes zero.
func round15(v float64) float64 {
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'e', 14, 64), 64)
	switch {
	case err != nil:
		return v // next to the largest float rounding up has no number
	case r == 0:
		return 0
	}
	return r
}

// cellUnits is how many UTF-16 units a cell holds; excelize cuts longer text
// in silence.
const cellUnits = 32767

// cutSays is longer in bytes than in units, so that the cell always holds it.
const cutSays = " … (cut here: a cell holds no more; the whole text is in the dump)"

// cut shortens a text that no cell holds and says so at its end.
func cut(s string) string {
	if len(s) <= cellUnits { // bytes are never fewer than units
		return s
	}
	units := utf16.Encode([]rune(s))
	if len(units) <= cellUnits {
		return s
	}
	keep := cellUnits - len(cutSays)
	if first := units[keep-1]; first >= 0xD800 && first < 0xDC00 {
		keep-- // never half a pair
	}
	return string(utf16.Decode(units[:keep])) + cutSays
}
