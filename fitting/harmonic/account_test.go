package harmonic

import "testing"

func TestWhatIsReadOffTheWavesHasAnAccount(t *testing.T) {
	for _, name := range []string{ReflectionMagnitude, ReturnTime} {
		if a := Account(name); a.Meaning == "" || len(a.Equation) < 2 || a.Source == "" {
			t.Errorf("%s: %+v", name, a)
		}
	}
}
