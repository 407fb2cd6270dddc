package casenote

import (
	"bytes"
	"os/exec"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestQuote(t *testing.T) {
	for _, c := range []struct{ arg, want, ascii string }{
		{"abp_mmHg=radial", "abp_mmHg=radial", "abp_mmHg=radial"},
		{"--from", "--from", "--from"},
		{"", "''", "''"},
		{"a b", "'a b'", "'a b'"},
		{"it's $HOME `x` \"\\", `'it'\''s $HOME ` + "`x`" + ` "\'`, `'it'\''s $HOME ` + "`x`" + ` "\'`},
		{"~", "'~'", "'~'"},
		{"=cmd", "'=cmd'", "'=cmd'"},
		{"a\x1b[2J'\\!", `$'a\033[2J\047\134\041'`, `$'a\033[2J\047\134\041'`},
		{"a\u202eb", `$'a\342\200\256b'`, `$'a\342\200\256b'`},
		{"\xff7", `$'\3777'`, `$'\3777'`},
		{"Größe", "'Größe'", `$'Gr\303\266\303\237e'`},
	} {
		if got := Quote([]string{c.arg}, false); got != c.want {
			t.Errorf("Quote(%q) = %s, want %s", c.arg, got, c.want)
		}
		if got := Quote([]string{c.arg}, true); got != c.ascii {
			t.Errorf("in ASCII, Quote(%q) = %s, want %s", c.arg, got, c.ascii)
		}
	}
}

// A shell reads the broken command line back as the same arguments.
func TestShellReadsTheSameArguments(t *testing.T) {
	bash, err := exec.LookPath("bash")
	if err != nil {
		t.Skip("there is no bash here to read the command line")
	}
	var lines bytes.Buffer
	var want []byte
	n := 0
	rapid.Check(t, func(t *rapid.T) {
		args := rapid.SliceOfN(anything, 0, 6).Draw(t, "args")
		lines.WriteString("say ")
		for _, s := range command(append([]string{"--"}, args...), 78, rapid.Bool().Draw(t, "ascii")) {
			lines.WriteString(s + "\n")
		}
		for _, a := range append([]string{"--"}, args...) {
			a, _, _ = strings.Cut(a, "\x00") // no argument can hold a NUL
			want = append(append(want, a...), 0)
		}
		n++
	})
	script := `say() { for a in "$@"; do printf '%s\0' "$a"; done; }` + "\n" + lines.String()
	cmd := exec.Command(bash, "--norc")
	cmd.Env = []string{"LC_ALL=C"}
	cmd.Stdin = strings.NewReader(script)
	got, err := cmd.Output()
	if err != nil {
		t.Fatal(err)
	}
	if n == 0 || !bytes.Equal(got, want) {
		t.Errorf("after %d command lines the shell read %d bytes, want %d", n, len(got), len(want))
	}
}

// A flag stays with its value where a line holds both.
func TestCommandBreaksBetweenArguments(t *testing.T) {
	long := strings.Repeat("x", 50)
	got := command([]string{"afterbeat", "study", "a.csv", "--pressure", "abp", "--from", "-3", "--one-beat", "--flow", long, "--to", "5"}, 40, false)
	want := []string{
		`afterbeat study a.csv --pressure abp \`,
		`    --from -3 --one-beat --flow \`,
		`    ` + long + ` \`,
		`    --to 5`,
	}
	if strings.Join(got, "\n") != strings.Join(want, "\n") {
		t.Errorf("got\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
}
