package study

import (
	"errors"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

func TestReadTakesWhatTheCaseSays(t *testing.T) {
	f := folder{"q.csv": "n,p,q\n0,80,1\n1,81,2\n2,82,3\n"}
	in, err := Read(casefile.Case{Recording: "q.csv", Time: "n", Unit: map[string]string{"p": "kPa", "n": "ms"}}, f.read)
	if err != nil {
		t.Fatal(err)
	}
	if r := in.Recording; r.Clock().Rate != 1000 || !near(r.Channels[0].Values[0], 80*7.500615758, 1e-9) {
		t.Errorf("rate %v, first pressure %v", r.Clock().Rate, r.Channels[0].Values[0])
	}
	if in, err = Read(casefile.Case{Recording: "q.csv", Rate: ptr(50.0)}, f.read); err != nil || in.Recording.Clock().Rate != 50 {
		t.Errorf("with a rate: %v, %v", in.Recording, err)
	}
}

// Errors of the files that a case names are those of the files, with name and
// line; the folder of the intervals to leave out is not shown.
func TestReadErrors(t *testing.T) {
	f := folder{
		"a.csv":      "time_s,abp_mmHg\n0,80\n1,x\n",
		"b.csv":      "time_s,abp_mmHg\n0,80\n1,81\n",
		"sub/ex.csv": "start_s,end_s\n3,2\n",
	}
	for _, c := range []struct{ recording, exclude, want string }{
		{"none.csv", "", "none.csv: cannot be read"},
		{"a.csv", "", "a.csv:3: abp_mmHg is not a number"},
		{"b.csv", "none.csv", "none.csv: cannot be read"},
		{"b.csv", "sub/ex.csv", "ex.csv:2: "},
	} {
		_, err := Read(casefile.Case{Recording: c.recording, Exclude: c.exclude}, f.read)
		var e *data.FileError
		if !errors.As(err, &e) || !strings.HasPrefix(err.Error(), c.want) {
			t.Errorf("%s, %s: %v, want %s", c.recording, c.exclude, err, c.want)
		}
	}
}
