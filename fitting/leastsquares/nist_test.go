package leastsquares

import (
	"bufio"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

// models are those of the Statistical Reference Datasets, as each file writes them.
var models = map[string]func(b []float64, x float64) float64{
	"Misra1a":  growth,
	"BoxBOD":   growth,
	"Chwirut2": func(b []float64, x float64) float64 { return math.Exp(-b[0]*x) / (b[1] + b[2]*x) },
	"DanWood":  func(b []float64, x float64) float64 { return b[0] * math.Pow(x, b[1]) },
	"Lanczos3": func(b []float64, x float64) float64 {
		return b[0]*math.Exp(-b[1]*x) + b[2]*math.Exp(-b[3]*x) + b[4]*math.Exp(-b[5]*x)
	},
	"Kirby2": func(b []float64, x float64) float64 {
		return (b[0] + b[1]*x + b[2]*x*x) / (1 + b[3]*x + b[4]*x*x)
	},
	"Hahn1":   cubic,
	"Thurber": cubic,
	"MGH17": func(b []float64, x float64) float64 {
		return b[0] + b[1]*math.Exp(-x*b[3]) + b[2]*math.Exp(-x*b[4])
	},
	"MGH09": func(b []float64, x float64) float64 { return b[0] * (x*x + x*b[1]) / (x*x + x*b[2] + b[3]) },
	"MGH10": func(b []float64, x float64) float64 { return b[0] * math.Exp(b[1]/(x+b[2])) },
	"Eckerle4": func(b []float64, x float64) float64 {
		z := (x - b[2]) / b[1]
		return b[0] / b[1] * math.Exp(-0.5*z*z)
	},
	"Rat43": func(b []float64, x float64) float64 { return b[0] / math.Pow(1+math.Exp(b[1]-b[2]*x), 1/b[3]) },
}

func growth(b []float64, x float64) float64 { return b[0] * (1 - math.Exp(-b[1]*x)) }

func cubic(b []float64, x float64) float64 {
	return (b[0] + x*(b[1]+x*(b[2]+x*b[3]))) / (1 + x*(b[4]+x*(b[5]+x*b[6])))
}

// certified is one file.
type certified struct {
	start     [2][]float64
	value, sd []float64
	sum       float64
	x, y      []float64
}

// read parses a file: rows "b1 = start start value sd", the sum, then y and x.
func read(t *testing.T, path string) certified {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	var c certified
	inData := false
	for in := bufio.NewScanner(f); in.Scan(); {
		line := in.Text()
		words := strings.Fields(line)
		number := func(i int) float64 {
			v, err := strconv.ParseFloat(words[i], 64)
			if err != nil {
				t.Fatalf("%s: %q: %v", path, line, err)
			}
			return v
		}
		switch {
		case inData && len(words) == 2:
			c.y, c.x = append(c.y, number(0)), append(c.x, number(1))
		case len(words) == 6 && strings.HasPrefix(words[0], "b") && words[1] == "=":
			c.start[0], c.start[1] = append(c.start[0], number(2)), append(c.start[1], number(3))
			c.value, c.sd = append(c.value, number(4)), append(c.sd, number(5))
		case strings.HasPrefix(line, "Residual Sum of Squares:"):
			c.sum = number(4)
		case strings.HasPrefix(line, "Data:") && len(words) == 3 && words[1] == "y":
			inData = true
		}
	}
	return c
}

func (c certified) problem(model func(b []float64, x float64) float64) Problem {
	return Problem{Count: len(c.y), Residuals: func(dst, b []float64) {
		for i, x := range c.x {
			dst[i] = model(b, x) - c.y[i]
		}
	}}
}

// Every set from both starts: six certified digits of every parameter, by central
// differences (testdata/README.md has the source).
func TestCertifiedValues(t *testing.T) {
	files, err := filepath.Glob(filepath.Join("testdata", "*.dat"))
	if err != nil || len(files) != len(models) {
		t.Fatalf("%d files, %d models, %v", len(files), len(models), err)
	}
	for _, path := range files {
		name := strings.TrimSuffix(filepath.Base(path), ".dat")
		c := read(t, path)
		if len(c.value) == 0 || len(c.x) < len(c.value) || c.sum == 0 {
			t.Fatalf("%s: %d parameters, %d points, sum %v", name, len(c.value), len(c.x), c.sum)
		}
		for i, start := range c.start {
			r := Minimise(t.Context(), c.problem(models[name]), start, Settings{})
			worst := 0.0
			for k, want := range c.value {
				worst = math.Max(worst, math.Abs(r.X[k]/want-1))
			}
			t.Logf("%-9s start %d: %.1f digits, %d evaluations", name, i+1, -math.Log10(worst+1e-16), r.Evaluations)
			if r.Status != Found || !(worst < 1e-6) || math.Abs(r.SumOfSquares/c.sum-1) > 1e-6 {
				t.Errorf("%s from start %d: %s, %v, want %v; sum %v, want %v", name, i+1, r.Status, r.X, c.value, r.SumOfSquares, c.sum)
				continue
			}
			for k, want := range c.sd {
				if got := r.StandardError(k); math.Abs(got/want-1) > 1e-4 {
					t.Errorf("%s: standard error %d is %v, want %v", name, k+1, got, want)
				}
			}
		}
	}
}
