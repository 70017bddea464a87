package figure

import "math"

// cellMM is how finely a Room knows what is taken.
const cellMM = 1.0

// Room remembers which cells of an area hold data or labels, so that a label
// is only set where nothing else is.
type Room struct {
	area       Box
	cols, rows int
	taken      []bool
}

// NewRoom returns an empty room over the area.
func NewRoom(area Box) *Room {
	r := &Room{area: area, cols: max(int(area.Width()/cellMM), 1), rows: max(int(area.Height()/cellMM), 1)}
	if r.cols > 1000 || r.rows > 1000 { // an absurd area: the sheet will refuse it
		r.cols, r.rows = 1, 1
	}
	r.taken = make([]bool, r.cols*r.rows)
	return r
}

func (r *Room) cell(p Point) (col, row int) {
	return int(math.Floor((p.X - r.area.Left) / cellMM)), int(math.Floor((p.Y - r.area.Top) / cellMM))
}

func (r *Room) take(col, row int) {
	if col >= 0 && col < r.cols && row >= 0 && row < r.rows {
		r.taken[row*r.cols+col] = true
	}
}

// TakeBox marks a box as taken.
func (r *Room) TakeBox(b Box) {
	c0, r0 := r.cell(Point{b.Left, b.Top})
	c1, r1 := r.cell(Point{b.Right - 1e-9, b.Bottom - 1e-9})
	for row := max(r0, 0); row <= min(r1, r.rows-1); row++ {
		for col := max(c0, 0); col <= min(c1, r.cols-1); col++ {
			r.take(col, row)
		}
	}
}

// TakeLine marks what a line through the points passes. The points lie on
// the area or near it.
func (r *Room) TakeLine(pts []Point) {
	for i := 1; i < len(pts); i++ {
		a, b := pts[i-1], pts[i]
		n := min(int(math.Hypot(b.X-a.X, b.Y-a.Y)/(cellMM/2))+1, 4000)
		for k := 0; k <= n; k++ {
			t := float64(k) / float64(n)
			r.take(r.cell(Point{a.X + t*(b.X-a.X), a.Y + t*(b.Y-a.Y)}))
		}
	}
}

// Find returns the free place of a box of the given size that is nearest to a
// point; it lies wholly in the area. ok is false when there is none within
// reach mm.
func (r *Room) Find(width, height float64, near Point, reach float64) (b Box, ok bool) {
	w, h := int(math.Ceil(width/cellMM)), int(math.Ceil(height/cellMM))
	col0, row0 := r.cell(Point{near.X - reach - width, near.Y - reach - height})
	col1, row1 := r.cell(Point{near.X + reach, near.Y + reach})
	best := reach * reach
	for row := max(row0, 0); row+h <= r.rows && row <= row1; row++ {
		for col := max(col0, 0); col+w <= r.cols && col <= col1; col++ {
			left, top := r.area.Left+float64(col)*cellMM, r.area.Top+float64(row)*cellMM
			c := Box{left, top, left + width, top + height}
			if d := c.distance2(near); d < best && r.free(col, row, w, h) {
				b, ok, best = c, true, d
			}
		}
	}
	return b, ok
}

// distance2 is the square of the distance from the box to a point, 0 inside.
func (b Box) distance2(p Point) float64 {
	dx := max(b.Left-p.X, p.X-b.Right, 0)
	dy := max(b.Top-p.Y, p.Y-b.Bottom, 0)
	return dx*dx + dy*dy
}

// free tells whether a block of cells holds nothing.
func (r *Room) free(col, row, w, h int) bool {
	for y := row; y < row+h; y++ {
		for _, taken := range r.taken[y*r.cols+col : y*r.cols+col+w] {
			if taken {
				return false
			}
		}
	}
	return true
}
