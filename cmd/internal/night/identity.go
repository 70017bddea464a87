package night

import (
	"crypto/sha256"
	"encoding/hex"
	"strconv"

	"lastdrop/report"
)

// digest stands for a signal and its readings: equal for two exports of one
// run, whatever their facts say.
type digest [sha256.Size]byte

// Identify returns the id of a run, 12 hex digits. It is for runs that no sweep
// takes; a sweep gives its evaluations their ids itself.
func Identify(e *report.Evaluation) (id string) {
	id, _ = identify(e)
	return id
}

// identify returns the id of a run and the digest of its readings. It is never
// changed: a ledger of many years holds these ids.
//
// The id is the first 6 bytes, in lower-case hex, of the SHA-256 over
//
//	len(signal)  ":" signal  LF
//	len(sample)  ":" sample  LF
//	len(started) ":" started LF
//	volume SP value LF           once for each reading, in the order of the dump
//
// Texts are the bytes of the record's fields signal, facts.sample and
// facts.started, empty when absent; their lengths are counted in bytes and
// written in decimal, so that no text can pass for two. Volumes are in mL and
// values in the unit of the signal, as converted, all readings of the run and
// not only those that a fit used. Each number has the form of C's %.8e: nine
// significant digits, correctly rounded half to even, and an exponent of at
// least two digits ("1.43500000e+01"); minus zero is written as zero.
//
// The digest is the whole SHA-256 over the line of the signal and the lines
// of the readings.
func identify(e *report.Evaluation) (id string, readings digest) {
	signal, lines := text(nil, e.Signal), readingLines(e)
	head := text(text(signal, e.Facts.Sample), e.Facts.Started)
	sum := sha256.Sum256(append(head, lines...))
	readings = sha256.Sum256(append(text(nil, e.Signal), lines...))
	return hex.EncodeToString(sum[:6]), readings
}

func text(to []byte, s string) []byte {
	to = strconv.AppendInt(to, int64(len(s)), 10)
	to = append(to, ':')
	to = append(to, s...)
	return append(to, '\n')
}

func readingLines(e *report.Evaluation) []byte {
	lines := make([]byte, 0, 32*len(e.AsRead))
	for _, r := range e.AsRead {
		lines = nineDigits(lines, r.VolumeML)
		lines = append(lines, ' ')
		lines = nineDigits(lines, r.Value)
		lines = append(lines, '\n')
	}
	return lines
}

func nineDigits(to []byte, v float64) []byte {
	if v == 0 {
		v = 0 // minus zero too
	}
	return strconv.AppendFloat(to, v, 'e', 8, 64)
}

// sameNineDigits is true for two numbers that the identity does not tell apart.
func sameNineDigits(a, b float64) bool {
	return string(nineDigits(nil, a)) == string(nineDigits(nil, b))
}
