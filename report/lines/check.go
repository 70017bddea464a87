package lines

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"io"

	"lastdrop/report"
)

// CheckEvaluations reads evaluations.jsonl strictly: one object a line with
// no field that the record lacks, none twice, no null, and a last line that
// is ended. It returns what it read and the first thing that is wrong, with
// its line.
func CheckEvaluations(r io.Reader) ([]report.Evaluation, error) {
	return check[report.Evaluation](r)
}

// CheckUnread is CheckEvaluations for unread.jsonl.
func CheckUnread(r io.Reader) ([]report.Unread, error) { return check[report.Unread](r) }

// CheckWaiting is CheckEvaluations for waiting.jsonl.
func CheckWaiting(r io.Reader) ([]report.Waiting, error) { return check[report.Waiting](r) }

func check[T any](r io.Reader) ([]T, error) {
	var all []T
	reader := bufio.NewReader(r)
	for number := 1; ; number++ {
		line, err := reader.ReadBytes('\n')
		switch {
		case err == io.EOF && len(line) == 0:
			return all, nil
		case err == io.EOF:
			return all, fmt.Errorf("line %d: the last line is not ended; the file is cut off", number)
		case err != nil:
			return all, err
		}
		one, err := object[T](line)
		if err != nil {
			return all, fmt.Errorf("line %d: %w", number, err)
		}
		all = append(all, one)
	}
}

func object[T any](line []byte) (one T, err error) {
	if err := noNullNorTwin(line); err != nil {
		return one, err
	}
	decoder := json.NewDecoder(bytes.NewReader(line))
	decoder.DisallowUnknownFields()
	if err := decoder.Decode(&one); err != nil {
		return one, err
	}
	if decoder.More() {
		return one, fmt.Errorf("more than one object; one a line")
	}
	return one, nil
}

// noNullNorTwin walks the tokens, because encoding/json takes null for any
// field and the last of two equal names without a word.
func noNullNorTwin(line []byte) error {
	decoder := json.NewDecoder(bytes.NewReader(line))
	var open []*level
	for {
		token, err := decoder.Token()
		if err == io.EOF {
			return nil
		} else if err != nil {
			return err
		}
		var in *level
		if len(open) > 0 {
			in = open[len(open)-1]
		}
		if name, isName := in.name(token); isName {
			if in.seen[name] {
				return fmt.Errorf("%q stands twice in one object", name)
			}
			in.seen[name] = true
			continue
		}
		switch token {
		case nil:
			return fmt.Errorf("null; an absent value is left out")
		case json.Delim('{'), json.Delim('['):
			open = append(open, &level{object: token == json.Delim('{'), seen: map[string]bool{}})
		case json.Delim('}'), json.Delim(']'):
			open = open[:len(open)-1]
		}
	}
}

// level is one open object or list; in an object every other token is a name.
type level struct {
	object, value bool
	seen          map[string]bool
}

func (l *level) name(token json.Token) (string, bool) {
	if l == nil || !l.object || token == json.Delim('}') {
		return "", false
	}
	l.value = !l.value
	name, isText := token.(string)
	return name, isText && l.value
}
