package archive

import (
	"archive/zip"
	"bytes"
	"compress/gzip"
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"
)

type file struct{ name, text string }

func zipped(t testing.TB, files ...file) []byte {
	t.Helper()
	var b bytes.Buffer
	z := zip.NewWriter(&b)
	for _, f := range files {
		w, err := z.Create(f.name)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := w.Write([]byte(f.text)); err != nil {
			t.Fatal(err)
		}
	}
	if err := z.Close(); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func gzipped(t testing.TB, text string) []byte {
	t.Helper()
	var b bytes.Buffer
	z := gzip.NewWriter(&b)
	if _, err := z.Write([]byte(text)); err != nil {
		t.Fatal(err)
	}
	if err := z.Close(); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func isDump(name string) bool { return strings.HasSuffix(strings.ToLower(name), ".csv") }

// listed is everything that Read says of an archive.
func listed(data []byte, name string, limits Limits) string {
	var lines []string
	skipped, problems := Read(bytes.NewReader(data), int64(len(data)), name, limits, isDump, func(m Member) bool {
		lines = append(lines, fmt.Sprintf("%s %.10q", m.Name, m.Data))
		return true
	})
	for _, p := range problems {
		lines = append(lines, "problem "+p.Error())
	}
	return strings.Join(append(lines, fmt.Sprintf("skipped %d", skipped)), "\n")
}

func noise(n int) string { // does not pack
	r := rand.New(rand.NewPCG(3, 4))
	b := make([]byte, n)
	for i := range b {
		b[i] = byte(r.Uint32())
	}
	return string(b)
}

func TestRead(t *testing.T) {
	limits := Limits{MemberBytes: 2 << 20, TotalBytes: 3 << 20, Members: 6, Ratio: 10}
	zeros := strings.Repeat("0", 1<<20)
	broken := zipped(t, file{"a.csv", noise(100)}, file{"b.csv", "2"})
	broken[len("PK")+28+20] ^= 0xff // in the packed bytes of a.csv
	locked := zipped(t, file{"a.csv", "1"})
	locked[bytes.Index(locked, []byte("PK\x01\x02"))+8] |= 1
	cut := gzipped(t, "0,3\n1,4\n")
	for _, c := range []struct {
		name, file string
		data       []byte
		want       string
	}{
		{"members in folders", "m/2031-04.zip", zipped(t, file{"day 1/", ""}, file{"day 1/a.csv", "1"}, file{"b.CSV", "2"}, file{"x.bmp", "3"}), "m/2031-04.zip/day 1/a.csv \"1\"\nm/2031-04.zip/b.CSV \"2\"\nskipped 1"},
		{"archives inside", "m.zip", zipped(t, file{"n.zip", "x"}, file{"o.csv.gz", "x"}), "skipped 2"},
		{"names that leave", "m.zip", zipped(t, file{"../a.csv", "1"}, file{`..\b.csv`, "1"}, file{"/c.csv", "1"}, file{"C:d.csv", "1"}, file{"./e.csv", "1"}),
			"m.zip/e.csv \"1\"\nproblem m.zip/../a.csv: its name leaves the archive; no honest program writes that; look where the archive comes from\nproblem m.zip/../b.csv: its name leaves the archive; no honest program writes that; look where the archive comes from\n" +
				"problem m.zip//c.csv: its name leaves the archive; no honest program writes that; look where the archive comes from\nproblem m.zip/C:d.csv: its name leaves the archive; no honest program writes that; look where the archive comes from\nskipped 0"},
		{"a bomb", "m.zip", zipped(t, file{"a.csv", zeros + "0"}, file{"b.csv", "2"}), "m.zip/b.csv \"2\"\nproblem m.zip/a.csv: unpacks to more than 10 times its size; unpack it by hand and look at it\nskipped 0"},
		{"packs well and is small", "m.zip", zipped(t, file{"a.csv", zeros}), "m.zip/a.csv \"0000000000\"\nskipped 0"},
		{"large member", "m.zip", zipped(t, file{"a.csv", noise(2<<20 + 1)}), "problem m.zip/a.csv: more than 2097152 bytes; a dump has at most 2097152 bytes\nskipped 0"},
		{"large in all", "m.zip", zipped(t, file{"a.csv", zeros}, file{"b.csv", zeros}, file{"c.csv", zeros}, file{"d.csv", "1"}, file{"e.csv", "1"}),
			"m.zip/a.csv \"0000000000\"\nm.zip/b.csv \"0000000000\"\nm.zip/c.csv \"0000000000\"\nproblem m.zip: its members unpack to more than 3145728 bytes; unpack it by hand and look at it\nskipped 0"},
		{"many members", "m.zip", zipped(t, file{"1", ""}, file{"2", ""}, file{"3", ""}, file{"4", ""}, file{"5", ""}, file{"6", ""}, file{"7", ""}), "problem m.zip: 7 members, the limit is 6; part it into several\nskipped 0"},
		{"no archive", "m.zip", []byte("volume_mL,pH\n"), "problem m.zip: is no zip archive: not a valid zip file; the archive is damaged; copy it again\nskipped 0"},
		{"damaged member", "m.zip", broken, "m.zip/b.csv \"2\"\nproblem m.zip/a.csv: cannot be unpacked: checksum error; the archive is damaged; copy it again\nskipped 0"},
		{"encrypted", "m.zip", locked, "problem m.zip/a.csv: is encrypted; unpack it with its password\nskipped 0"},
		{"gzip", "in/a.csv.gz", gzipped(t, "0,3\n"), "in/a.csv.gz/a.csv \"0,3\\n\"\nskipped 0"},
		{"gzip of another file", "in/a.tar.gz", gzipped(t, "0,3\n"), "skipped 1"},
		{"gzip cut off", "a.csv.gz", cut[:len(cut)-4], "problem a.csv.gz/a.csv: cannot be unpacked: unexpected EOF; the archive is damaged; copy it again\nskipped 0"},
		{"no gzip", "a.csv.gz", []byte("0,3\n1,2\n123456"), "problem a.csv.gz: is no gzip archive: invalid header; the archive is damaged; copy it again\nskipped 0"},
		{"gzip bomb", "a.csv.gz", gzipped(t, zeros+"0"), "problem a.csv.gz/a.csv: unpacks to more than 10 times its size; unpack it by hand and look at it\nskipped 0"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := listed(c.data, c.file, limits); got != c.want {
				t.Errorf("\ngot  %s\nwant %s", got, c.want)
			}
		})
	}
}

func TestStopsWhenAsked(t *testing.T) {
	data := zipped(t, file{"a.csv", "1"}, file{"b.csv", "2"})
	n := 0
	Read(bytes.NewReader(data), int64(len(data)), "m.zip", Default(), isDump, func(Member) bool { n++; return false })
	if n != 1 {
		t.Errorf("%d members after a no", n)
	}
}

// Whatever the bytes: no panic, no member beyond its limit, every name inside
// the archive.
func FuzzRead(f *testing.F) {
	f.Add(zipped(f, file{"a.csv", "1,2\n"}, file{"../b.csv", "2"}), true)
	f.Add(gzipped(f, "0,3\n"), false)
	limits := Limits{MemberBytes: 1 << 16, TotalBytes: 1 << 18, Members: 50, Ratio: 50}
	f.Fuzz(func(t *testing.T, data []byte, isZip bool) {
		name := "x.csv.gz"
		if isZip {
			name = "x.zip"
		}
		total := 0
		_, problems := Read(bytes.NewReader(data), int64(len(data)), name, limits, func(string) bool { return true }, func(m Member) bool {
			total += len(m.Data)
			if len(m.Data) > 1<<16 || total > 1<<18 || !strings.HasPrefix(m.Name, name+"/") || strings.Contains(m.Name, "/../") {
				t.Fatalf("member %q of %d bytes, %d in all", m.Name, len(m.Data), total)
			}
			return true
		})
		for _, p := range problems {
			if !strings.HasPrefix(p.Path, name) || p.Msg == "" {
				t.Fatalf("problem %v", p)
			}
		}
	})
}
