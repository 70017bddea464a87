package terminal

import (
	"bytes"
	"fmt"
	"strings"
	"testing"

	"lastdrop/report"
)

func mail(t *testing.T, n *report.Night, files ...string) string {
	t.Helper()
	var b bytes.Buffer
	if err := Summary(&b, n, SummaryOptions{Files: files}); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func TestMail(t *testing.T) {
	golden(t, "mail.txt", mail(t, inventedNight(), "out/summary.pdf", "out/summary.xlsx"))
}

func TestMailOfAQuietNight(t *testing.T) {
	sound := twofold()
	n := &report.Night{Lastdrop: "0.1.0", Date: "2031-04-03", Evaluations: []report.Evaluation{sound}}
	// Written by hand after the page language: what happened first, the
	// caution last.
	want := `Nothing to settle: the one run is sound.
The run carries no objection, which is not an approval.
Published 3 April 2031.

[!]    0 disputed, a second person must settle it
<!>    0 doubtful, look before use
( )    1 sound,    no objection, not an approval
[?]    0 unread,   not read, no result

Advisory until an authorised person has approved it. The laboratory's
own validated procedure, safety data sheets and local regulations come
first.
`
	if got := mail(t, n); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}

// 43 runs to look at: 12 are told, 31 counted.
func TestMailListsTwelve(t *testing.T) {
	n := inventedNight()
	n.Evaluations = nil
	for i := 0; i < 43; i++ {
		e := overshot()
		e.Facts.Sample = fmt.Sprintf("S-%02d", i)
		n.Evaluations = append(n.Evaluations, e)
		n.Unread = append(n.Unread, n.Unread[0])
	}
	got := mail(t, n)
	for _, want := range []string{"[!] S-00, vinegar acidity", "[!] S-11, vinegar acidity", "And 31 more (disputed); the files below have all.", "And 33 more; the files below have all."} {
		if !strings.Contains(got, want+"\n") {
			t.Errorf("lacks %q", want)
		}
	}
	if strings.Contains(got, "S-12") {
		t.Error("the thirteenth is told")
	}
}

func TestMailFitsAndIsHarmless(t *testing.T) {
	n := inventedNight()
	n.Evaluations = append(n.Evaluations, hostile())
	n.Laboratory = "\x1b[2J" + strings.Repeat("long ", 60)
	for i, l := range strings.Split(mail(t, n), "\n") {
		if cells(l) > 80 {
			t.Errorf("line %d has %d columns: %s", i+1, cells(l), l)
		}
		if strings.ContainsAny(l, "\x1b\x07\r\u202E\u009b") {
			t.Errorf("line %d lets a control through: %q", i+1, l)
		}
	}
}
