// Package paper writes sheets into a PDF file. It is all that knows of gofpdf,
// which is archived; a kept fork has the same methods, so that changing the
// import is the whole move.
//
// Lines, areas and discs are content-stream text of its own: a disc is a line
// of no length with round ends, and two decimals of a point are finer than any
// printer. gofpdf sets only what it must know of: fonts, the characters used
// of them, links, bookmarks.
package paper

import (
	"bytes"
	"io"
	"math"
	"strconv"
	"time"
	"unicode/utf16"

	"github.com/jung-kurt/gofpdf"

	"lastdrop/report/figure"
)

// File is a PDF file being written; a page at a time it is a figure.Canvas.
type File struct {
	pdf    *gofpdf.Fpdf
	pageH  float64 // pt
	buf    bytes.Buffer
	fonts  map[figure.Face]*face
	links  map[int]int // gofpdf's number of the link to each page
	font   figure.Style
	stroke figure.Ink
	fill   figure.Ink
	width  float64 // pt
	dash   figure.Dash
	round  bool
}

// About is what the file says of itself.
type About struct {
	Title, Creator, Subject string
	Date                    string // 2031-04-03, the only date in the file
}

// face is a font in use and the characters that gofpdf knows are used.
type face struct {
	family string
	known  map[rune]bool
}

const ptPerMM = 72 / 25.4

// New begins a file of sheets of the given size, mm. Its bytes depend on what
// is drawn and on about, not on the clock.
func New(widthMM, heightMM float64, about About) *File {
	pdf := gofpdf.NewCustom(&gofpdf.InitType{
		OrientationStr: "P", UnitStr: "mm", Size: gofpdf.SizeType{Wd: widthMM, Ht: heightMM},
	})
	pdf.SetMargins(0, 0, 0)
	pdf.SetAutoPageBreak(false, 0)
	pdf.SetCompression(false) // pack does
	pdf.SetCatalogSort(true)
	// gofpdf takes the clock for a date that is zero.
	date, err := time.Parse(time.DateOnly, about.Date)
	if err != nil {
		date = time.Date(2000, 1, 1, 0, 0, 0, 0, time.UTC)
	}
	pdf.SetCreationDate(date)
	pdf.SetModificationDate(date)
	for _, set := range [...]struct {
		to   func(string, bool)
		text string
	}{{pdf.SetTitle, about.Title}, {pdf.SetCreator, about.Creator}, {pdf.SetSubject, about.Subject}} {
		text, _ := figure.Clean(set.text)
		set.to(text, true)
	}
	return &File{pdf: pdf, fonts: map[figure.Face]*face{}, links: map[int]int{}}
}

// Page adds a page and plays a sheet to it; a sheet that cannot be drawn adds
// none.
func (c *File) Page(s *figure.Sheet, marks ...Bookmark) error {
	if err := s.Err(); err != nil {
		return err
	}
	c.begin()
	for _, b := range marks {
		c.use(bookmarkFont) // gofpdf writes bookmarks in the encoding of the font in use
		text, _ := figure.Clean(b.Text)
		c.pdf.Bookmark(text, b.Level, 0)
	}
	err := s.Play(c)
	c.flush()
	return err
}

// Bookmark is an entry of the outline that leads to a page, level 0 outermost.
type Bookmark struct {
	Text  string
	Level int
}

var bookmarkFont = figure.Style{Face: figure.Regular, SizePt: 6.5, Ink: figure.Black}

// WriteTo writes the whole file.
func (c *File) WriteTo(w io.Writer) (n int64, err error) {
	count := counter{to: w}
	err = c.pdf.Output(packer{&count})
	return count.n, err
}

type counter struct {
	to io.Writer
	n  int64
}

func (c *counter) Write(p []byte) (int, error) {
	n, err := c.to.Write(p)
	c.n += int64(n)
	return n, err
}

// begin starts a page: nothing of the graphics state is known there.
func (c *File) begin() {
	c.pdf.AddPage()
	_, h := c.pdf.GetPageSize()
	c.pageH = h * ptPerMM
	c.font, c.stroke, c.fill, c.width, c.dash, c.round = figure.Style{}, 1<<24, 1<<24, -1, figure.Solid, false
	c.buf.WriteString("0 J\n") // gofpdf begins each page with square ends
}

// flush hands the text gathered so far to the page.
func (c *File) flush() {
	if c.buf.Len() > 0 {
		c.pdf.RawWriteBuf(&c.buf)
		c.buf.Reset()
	}
}

// num writes v with at most two decimals.
func (c *File) num(v float64) {
	b := c.buf.AvailableBuffer()
	h := int64(math.Round(v * 100))
	if h < 0 {
		b, h = append(b, '-'), -h
	}
	b = strconv.AppendInt(b, h/100, 10)
	if f := h % 100; f != 0 {
		b = append(b, '.', byte('0'+f/10))
		if f%10 != 0 {
			b = append(b, byte('0'+f%10))
		}
	}
	c.buf.Write(append(b, ' '))
}

func (c *File) point(p figure.Point, op string) {
	c.num(p.X * ptPerMM)
	c.num(c.pageH - p.Y*ptPerMM)
	c.buf.WriteString(op)
}

// ink sets the colour of lines (RG) or areas and text (rg) unless it is set.
func (c *File) ink(have *figure.Ink, want figure.Ink, op string) {
	if *have == want {
		return
	}
	*have = want
	for _, v := range [...]figure.Ink{want >> 16 & 255, want >> 8 & 255, want & 255} {
		c.buf.WriteString(strconv.FormatFloat(float64(v)/255, 'f', 3, 64))
		c.buf.WriteByte(' ')
	}
	c.buf.WriteString(op)
}

// pen sets colour, width, pattern and ends of lines.
func (c *File) pen(ink figure.Ink, widthPt float64, dash figure.Dash, round bool) {
	c.ink(&c.stroke, ink, "RG\n")
	if c.width != widthPt {
		c.width = widthPt
		c.num(widthPt)
		c.buf.WriteString("w\n")
	}
	if c.dash != dash {
		c.dash = dash
		c.buf.WriteString(pattern(dash))
	}
	if c.round != round {
		c.round = round
		if round {
			c.buf.WriteString("1 J\n")
		} else {
			c.buf.WriteString("0 J\n")
		}
	}
}

func pattern(d figure.Dash) string {
	switch d {
	case figure.Dashed:
		return "[1.6 1.2] 0 d\n"
	case figure.Dotted:
		return "[0 1.8] 0 d\n"
	case figure.DashDot:
		return "[5 1.6 1 1.6] 0 d\n"
	case figure.Broken:
		return "[1.2 .9] 0 d\n"
	}
	return "[] 0 d\n"
}

// Stroke is part of figure.Canvas, as are the methods below.
func (c *File) Stroke(pts []figure.Point, closed bool, s figure.Stroke) {
	c.pen(s.Ink, s.WidthPt, s.Dash, s.Dash == figure.Dotted)
	c.path(pts)
	if closed {
		c.buf.WriteString("s\n")
	} else {
		c.buf.WriteString("S\n")
	}
}

// curvePoints is from how many points on a path is a curve, whose places need
// no more than a tenth of a point, 0.035 mm; rules and marks meet more exactly.
const curvePoints = 9

func (c *File) path(pts []figure.Point) {
	place := c.point
	if len(pts) >= curvePoints {
		place = c.tenth
	}
	place(pts[0], "m\n")
	for _, p := range pts[1:] {
		place(p, "l\n")
	}
}

// tenth writes a place to a tenth of a point of the page.
func (c *File) tenth(p figure.Point, op string) {
	c.num(math.Round(p.X*ptPerMM*10) / 10)
	c.num(math.Round((c.pageH-p.Y*ptPerMM)*10) / 10)
	c.buf.WriteString(op)
}

func (c *File) Fill(pts []figure.Point, ink figure.Ink) {
	c.ink(&c.fill, ink, "rg\n")
	c.path(pts)
	c.buf.WriteString("f\n")
}

func (c *File) Dots(pts []figure.Point, diameterMM float64, ink figure.Ink) {
	c.pen(ink, diameterMM*ptPerMM, figure.Solid, true)
	for _, p := range pts {
		// A tenth of a point is fine enough, and most of a page of small
		// pictures is these places. A closed path of one place is a disc by
		// its round ends.
		c.tenth(p, "m h\n")
	}
	c.buf.WriteString("S\n")
}

// Text writes the string itself once gofpdf knows all its characters; until
// then gofpdf does, which is how it learns them.
func (c *File) Text(at figure.Point, s figure.Style, text string) {
	c.ink(&c.fill, s.Ink, "rg\n")
	f := c.use(s)
	if f.learn(text) {
		c.flush()
		c.pdf.Text(at.X, at.Y, text)
		return
	}
	c.buf.WriteString("BT ")
	c.point(at, "Td (")
	for _, u := range utf16.Encode([]rune(text)) {
		c.byte(byte(u >> 8))
		c.byte(byte(u))
	}
	c.buf.WriteString(") Tj ET\n")
}

// byte writes one byte of a string in brackets.
func (c *File) byte(b byte) {
	switch b {
	case '(', ')', '\\':
		c.buf.WriteByte('\\')
	case '\r':
		c.buf.WriteString("\\r")
		return
	}
	c.buf.WriteByte(b)
}

// use selects font and size, embedding the font on first use.
func (c *File) use(s figure.Style) *face {
	f := c.fonts[s.Face]
	if f == nil {
		f = &face{family: family(s.Face), known: map[rune]bool{}}
		c.fonts[s.Face] = f
		c.pdf.AddUTF8FontFromBytes(f.family, "", bytes.Clone(leanFonts()[s.Face])) // gofpdf writes into what it is given
	}
	if c.font.Face != s.Face || c.font.SizePt != s.SizePt {
		c.flush()
		c.pdf.SetFont(f.family, "", s.SizePt)
		c.font = s
	}
	return f
}

func family(f figure.Face) string {
	return [...]string{"go", "goregular", "gomedium", "gobold", "goitalic", "gomono"}[f]
}

// learn marks the characters of text as known and tells whether one was new.
func (f *face) learn(text string) (news bool) {
	for _, r := range text {
		if !f.known[r] {
			f.known[r], news = true, true
		}
	}
	return news
}

func (c *File) Link(b figure.Box, page int) {
	n, ok := c.links[page]
	if !ok {
		n = c.pdf.AddLink()
		c.pdf.SetLink(n, 0, page)
		c.links[page] = n
	}
	c.pdf.Link(b.Left, b.Top, b.Width(), b.Height(), n)
}
