package casefile

import "errors"

// errLabel does not repeat the label: it may be the name of a patient.
var errLabel = errors.New("does not look like a research label, such as pilot-07: " +
	"want letters, digits and - _ . only, 32 at most, a letter and one to five digits among them; " +
	"never a name or a date of birth")

// CheckLabel checks that s looks like a research label: letters and digits of
// ASCII, and - _ . only; 32 characters at most; at least one letter, and one to
// five digits. So there is no room for a full name with its blank, for a bare
// name, for a date of birth (six digits or more) or for a hospital number. It
// cannot tell a name with a digit behind it from a study's code. The empty
// label is none, and passes.
func CheckLabel(s string) error {
	letters, digits := 0, 0
	for _, r := range s {
		switch {
		case r >= 'a' && r <= 'z', r >= 'A' && r <= 'Z':
			letters++
		case r >= '0' && r <= '9':
			digits++
		case r != '-' && r != '_' && r != '.':
			return errLabel
		}
	}
	if s != "" && (len(s) > 32 || letters == 0 || digits == 0 || digits > 5) {
		return errLabel
	}
	return nil
}
