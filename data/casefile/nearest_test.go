package casefile

import (
	"testing"

	"pgregory.net/rapid"
)

// Distances counted by hand; CA to ABC is 3 by the restricted distance (2 by
// the unrestricted one), the textbook example that tells the two apart.
func TestDistance(t *testing.T) {
	for _, c := range []struct {
		a, b string
		want int
	}{{"", "", 0}, {"", "abc", 3}, {"kitten", "sitting", 3}, {"presure", "pressure", 1}, {"flwo", "flow", 1}, {"ca", "abc", 3}, {"größe", "grösse", 2}} {
		if got := distance([]rune(c.a), []rune(c.b)); got != c.want {
			t.Errorf("distance(%q, %q) = %d, want %d", c.a, c.b, got, c.want)
		}
	}
}

func TestDistanceIsSymmetric(t *testing.T) {
	word := rapid.StringMatching(`[abc]{0,8}`)
	rapid.Check(t, func(t *rapid.T) {
		a, b := []rune(word.Draw(t, "a")), []rune(word.Draw(t, "b"))
		d := distance(a, b)
		if d != distance(b, a) || (d == 0) != (string(a) == string(b)) || d > max(len(a), len(b)) || d < len(a)-len(b) {
			t.Fatalf("distance(%q, %q) = %d, back %d", string(a), string(b), d, distance(b, a))
		}
	})
}

func TestNearest(t *testing.T) {
	commands := []string{"check", "fit", "study", "solve", "batch", "demo"}
	for _, c := range []struct{ word, want string }{
		{"chekc", "check"},
		{"fti", "fit"},
		{"Study", "study"},
		{"bach", "batch"},
		{"fit", "fit"},
		{"a.csv", ""},
		{"recording.csv", ""},
		{"", ""},
		{"deom", "demo"},
		{"dmoe", ""},
		{"xy", ""},
	} {
		got, ok := Nearest(c.word, commands)
		if got != c.want || ok != (c.want != "") {
			t.Errorf("Nearest(%q) = %q, %v, want %q", c.word, got, ok, c.want)
		}
	}
}
