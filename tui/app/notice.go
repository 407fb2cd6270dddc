package app

import (
	"errors"
	"fmt"
	"regexp"
	"slices"
	"strings"

	"afterbeat/data"
	"afterbeat/tree/study"
)

// notice is an error that stands until it is answered.
type notice struct {
	text, hint data.Text
	computing  bool   // of the present case, so that a change of it takes it away
	atStart    string // the flag of a choice that no screen changes
	question   bool   // that the first stage asks, and no error there
}

// most errors that wait to be answered.
const most = 9

// noticeOf makes an error and its hint safe to show.
func noticeOf(err error) notice {
	var (
		file    *data.FileError
		choice  *study.ChoiceError
		several *data.AmbiguousError
	)
	n := notice{text: data.Clean(err.Error())}
	switch {
	case errors.As(err, &file):
		n.hint = data.Clean(file.Hint)
	case errors.As(err, &choice):
		n.text = data.Clean(strings.Replace(err.Error(), choice.Error(), inWords(choice), 1))
		n.hint = data.Clean(flags.ReplaceAllStringFunc(choice.Hint, flagInWords))
		if key, _, _ := strings.Cut(choice.Key, "."); !slices.Contains(onIntake, key) {
			n.atStart = choice.Flag()
		}
	case errors.As(err, &several) && several.Role != "":
		n.text, n.question = data.Clean(choose(several)), true
	}
	return n
}

// onIntake are the choices that the first stage changes.
var onIntake = []string{
	"pressure", "flow", "velocity", "site", "unit", "invert", "scale", "offset", "from", "to",
	"diameter_cm", "angle_deg", "delay", "outflow_pressure",
}

// choose says what is to be chosen between on the first stage, and how.
func choose(e *data.AmbiguousError) string {
	count := [...]string{2: "two", 3: "three", 4: "four"}
	n := fmt.Sprint(len(e.Names))
	if i := len(e.Names); i > 1 && i < len(count) {
		n = count[i]
	}
	return fmt.Sprintf("%s channels could be the %s: j/k, then enter", n, e.Role)
}

// inWords is an error of a choice with its key in words in place of the flag.
func inWords(e *study.ChoiceError) string {
	key, of, table := strings.Cut(e.Key, ".")
	for _, unit := range []string{"_cm", "_deg"} {
		key = strings.TrimSuffix(key, unit)
	}
	words := strings.ReplaceAll(key, "_", " ")
	if table {
		words += " of " + of
	}
	return words + ": " + flags.ReplaceAllStringFunc(e.What, flagInWords)
}

// flags are those of the command line, which a screen does not have.
var flags = regexp.MustCompile(`(?:^|\B)--[a-z]+(?:-[a-z]+)*`)

func flagInWords(flag string) string {
	return strings.ReplaceAll(strings.TrimPrefix(flag, "--"), "-", " ")
}
