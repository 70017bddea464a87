package demo

import "bytes"

// truncate ends a dump in the middle of a row, after two thirds of it.
func truncate(data []byte) []byte {
	cut := bytes.LastIndexByte(data[:2*len(data)/3], '\n')
	return data[:cut+1+4]
}

// swapMarks puts a decimal point in place of the comma of the first so many
// pH values of a dump of Bench A; one value alone is taken from the tenth row.
func swapMarks(data []byte, count int) []byte {
	table := bytes.Index(data, []byte("\r\n\r\n")) + 4
	lines := bytes.SplitAfter(data[table:], []byte("\r\n"))
	first := 1
	if count == 1 {
		first = 10
	}
	for i := first; i < first+count; i++ {
		cells := bytes.Split(lines[i], []byte(";"))
		cells[1] = bytes.Replace(cells[1], []byte(","), []byte("."), 1)
		lines[i] = bytes.Join(cells, []byte(";"))
	}
	return append(append([]byte(nil), data[:table]...), bytes.Join(lines, nil)...)
}

// weighings is the log of a balance: no titration at all.
const weighings = `balance log
pan;mass
VIN-0230;1.5021
VIN-0231;1.5008
`

const nightNotes = `# Night notes, Tern Island Preserves (invented)

Bench A: electrode slow after lunch, rinsed twice. Bench B: silver nitrate refilled at noon.
`

// picture draws a beaker of 24 by 24 points as an uncompressed bitmap.
func picture() []byte {
	const side, header = 24, 54
	size := header + 3*side*side
	b := make([]byte, header, size)
	b[0], b[1] = 'B', 'M'
	b[2], b[3] = byte(size&0xff), byte(size>>8)
	b[10], b[14] = header, 40
	b[18], b[22] = side, side
	b[26], b[28] = 1, 24
	for y := range side { // from the bottom up
		for x := range side {
			wall := (x == 5 || x == 18) && y > 2 && y < 21 || y == 3 && x > 4 && x < 19
			filled := x > 5 && x < 18 && y > 3 && y < 14
			switch {
			case wall:
				b = append(b, 60, 60, 60)
			case filled:
				b = append(b, 200, 170, 120)
			default:
				b = append(b, 255, 255, 255)
			}
		}
	}
	return b
}
