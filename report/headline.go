package report

import (
	"strconv"
	"strings"
	"time"
)

// Headline says in two sentences what a night is about: first what must be
// done, then how the rest stands.
func (n *Night) Headline() (must, rest string) {
	return n.mustDo(), n.howTheRestStands()
}

func (n *Night) mustDo() string {
	disputed, doubtful, unread := n.Count(VerdictDisputed), n.Count(VerdictDoubtful), len(n.Unread)
	runs := len(n.Evaluations)
	switch {
	case runs+unread == 0:
		return "There was no run to read."
	case runs == 0:
		return "No run could be read, " + Number(unread) + plural(unread, " is", " are") + " unread."
	case runs == 1 && disputed+doubtful+unread == 0:
		return "Nothing to settle: the one run is sound."
	case disputed+doubtful+unread == 0:
		return "Nothing to settle: all " + Number(runs) + " runs are sound."
	}
	var said []string
	if disputed > 0 {
		said = append(said, Some(disputed, "run", "runs")+" must be settled")
	}
	if doubtful > 0 {
		who := Number(doubtful)
		if disputed == 0 {
			who = Some(doubtful, "run", "runs")
		}
		said = append(said, who+plural(doubtful, " needs", " need")+" a look")
	}
	if unread > 0 {
		what := Number(unread)
		if len(said) == 0 {
			what = Some(unread, "dump or run", "dumps or runs")
		}
		said = append(said, what+plural(unread, " is", " are")+" unread")
	}
	return Upper(strings.Join(said, ", ")) + "."
}

func (n *Night) howTheRestStands() string {
	var said []string
	if runs := len(n.Evaluations); runs > 0 {
		said = append(said, objections(n.Count(VerdictSound), runs))
	}
	switch {
	case len(n.Unread) > 0:
		said = append(said, "What is unread has no result.")
	case len(n.Evaluations) == 0:
		said = append(said, "Nothing is to be done.")
	}
	return strings.Join(said, " ")
}

func objections(sound, runs int) string {
	switch {
	case sound == 0:
		return "No run is without objection."
	case sound == runs && runs == 1:
		return "The run carries no objection, which is not an approval."
	case sound == runs:
		return "All " + Number(runs) + " runs carry no objection, which is not an approval."
	}
	return Upper(Number(sound)) + " of " + Some(runs, "run", "runs") + plural(sound, " carries", " carry") + " no objection, which is not an approval."
}

// Some joins a number with its noun: "one run", "31 runs".
func Some(count int, one, many string) string {
	return Number(count) + " " + plural(count, one, many)
}

// Number writes counts up to twelve as words.
func Number(count int) string {
	words := [...]string{"none", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"}
	if count >= 0 && count < len(words) {
		return words[count]
	}
	return strconv.Itoa(count)
}

func plural(count int, one, many string) string {
	if count == 1 {
		return one
	}
	return many
}

// Upper makes the first letter of a sentence a capital.
func Upper(s string) string {
	if s == "" {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}

// Day writes a date for people: "2031-04-02" is "2 April 2031". What is no
// date stays as it is.
func Day(date string) string {
	t, err := time.Parse(time.DateOnly, date)
	if err != nil {
		return date
	}
	return t.Format("2 January 2006")
}

// Days says which days the runs are of, "" when none states its start.
func (n *Night) Days() string {
	switch {
	case n.FirstDay == "":
		return ""
	case n.LastDay == "" || n.FirstDay == n.LastDay:
		return "runs of " + Day(n.FirstDay)
	}
	return "runs of " + Day(n.FirstDay) + " to " + Day(n.LastDay)
}

// Moment writes the start of a run for people: "2 April 2031, 08:14 +02:00";
// seconds only where the dump has some. What is no time stays as it is.
func Moment(started string) string {
	for _, layout := range [...]string{time.RFC3339, "2006-01-02T15:04:05"} {
		t, err := time.Parse(layout, started)
		if err != nil {
			continue
		}
		form := "2 January 2006, 15:04"
		if t.Second() != 0 {
			form += ":05"
		}
		if layout == time.RFC3339 {
			form += " -07:00"
		}
		return t.Format(form)
	}
	return started
}
