package xlsx

import (
	"math"
	"strconv"
	"strings"

	"github.com/xuri/excelize/v2"

	"lastdrop/report"
	scale "lastdrop/report/figure"
)

// chartsMost is how many charts a workbook holds: each costs about 7 ms and
// 1 MB to write and as much to open (measured 2026). The pages have all curves.
const chartsMost = 50

// A chart stands right of the columns of its block; it is as high as
// chartRows rows of the usual height.
const (
	chartColumn          = "M"
	chartRows            = 20
	chartWide, chartHigh = 620, 330 // px
)

// chart draws a block: readings as discs, the computed curve as a line, on a
// scale of what was used. Inks are set for all, since some office programs
// draw nothing in the inks of a theme.
func (s *sheet) chart(b *block) {
	if s.err != nil || len(b.used) < 2 {
		return
	}
	c := excelize.Chart{
		Type:      excelize.Scatter,
		Dimension: excelize.ChartDimension{Width: chartWide, Height: chartHigh},
		Legend:    excelize.ChartLegend{Position: "none"},
		Title:     excelize.ChartTitle{Paragraph: chartText(b.title(), 11, true)},
		XAxis:     b.axisX(), YAxis: b.axisY(),
		Border:       excelize.LineOptions{Type: excelize.LineNone},
		ShowBlanksAs: "gap",
	}
	row := b.first
	for _, part := range [...]struct {
		count int
		edge  string
	}{{len(b.used), ink}, {len(b.out), "A3A5A8"}} {
		if part.count > 0 {
			c.Series = append(c.Series, readingSeries(row, part.count, part.edge))
			row += part.count
		}
	}
	for _, l := range b.lines {
		c.Series = append(c.Series, lineSeries(row, len(l.pts)))
		row += len(l.pts)
	}
	s.err = s.book.file.AddChart(s.name, chartColumn+strconv.Itoa(b.first), &c)
}

// curveCells is a reference to cells of one column.
func curveCells(column string, row, count int) string {
	return "'" + curvesSheet + "'!$" + column + "$" + strconv.Itoa(row) + ":$" + column + "$" + strconv.Itoa(row+count-1)
}

func readingSeries(row, count int, colour string) excelize.ChartSeries {
	fill := solid(colour)
	return excelize.ChartSeries{
		Name: "'" + curvesSheet + "'!$" + curveReading + "$1", Categories: curveCells(curveX, row, count), Values: curveCells(curveReading, row, count),
		Line:   excelize.LineOptions{Type: excelize.LineNone},
		Marker: excelize.ChartMarker{Symbol: "circle", Size: 3, Fill: fill, Border: excelize.LineOptions{Type: excelize.LineSolid, Fill: fill, Width: 0.5}},
	}
}

func lineSeries(row, count int) excelize.ChartSeries {
	return excelize.ChartSeries{
		Name: "'" + curvesSheet + "'!$" + curveFitted + "$1", Categories: curveCells(curveX, row, count), Values: curveCells(curveFitted, row, count),
		Fill: solid(blue), Line: excelize.LineOptions{Type: excelize.LineSolid, Fill: solid(blue), Width: 1.25},
		Marker: excelize.ChartMarker{Symbol: "none"},
	}
}

func solid(colour string) excelize.Fill {
	return excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{colour}}
}

func chartText(words string, size float64, bold bool) []excelize.RichTextRun {
	return []excelize.RichTextRun{{Text: words, Font: &excelize.Font{Family: font, Size: size, Bold: bold, Color: ink}}}
}

// titleMost is how many characters a chart's title has at most.
const titleMost = 60

// title tells the run and, in words, its verdict.
func (b *block) title() string {
	name := []rune(report.Visible(b.e.Facts.Sample))
	if len(name) > titleMost {
		name = append(append(name[:titleMost/2:titleMost/2], '…'), name[len(name)-titleMost/2:]...)
	}
	return strings.TrimSpace(string(name)+" "+b.e.ID) + ", " + string(b.e.Verdict)
}

func (b *block) axisX() excelize.ChartAxis {
	from, to := b.used[0].VolumeML, b.used[0].VolumeML
	for _, d := range append(b.used[:len(b.used):len(b.used)], b.out...) {
		from, to = min(from, d.VolumeML), max(to, d.VolumeML)
	}
	return axis(min(from, 0), to, report.Visible(b.e.Picture.XName))
}

// axisY takes in the readings used and the curve; one that was left out may
// lie beyond.
func (b *block) axisY() excelize.ChartAxis {
	low, high := math.Inf(1), math.Inf(-1)
	for _, d := range b.used {
		low, high = min(low, d.Value), max(high, d.Value)
	}
	a := axis(low, high, b.e.Picture.YName)
	a.MajorGridLines = true
	return a
}

func axis(from, to float64, name string) excelize.ChartAxis {
	if !(to > from) {
		from, to = from-1, to+1
	}
	t := scale.NewTicks(from, to, 8)
	from, to = scale.Rounded(from, to, 8)
	from, to = round15(from), round15(to)
	format := "0"
	if t.Decimals > 0 {
		format += "." + strings.Repeat("0", t.Decimals)
	}
	return excelize.ChartAxis{Minimum: &from, Maximum: &to, MajorUnit: t.Step, TickLabelPosition: excelize.ChartTickLabelLow,
		Font: excelize.Font{Family: font, Size: 8, Color: second}, NumFmt: excelize.ChartNumFmt{CustomNumFmt: format},
		Title: excelize.ChartTitle{Paragraph: chartText(name, 9, false)}}
}
