package main

import (
	"errors"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
)

// options are the flags of a command that works on a case.
type options struct {
	flags   *pflag.FlagSet
	chosen  casefile.Case // what the flags say
	json    bool
	ascii   bool
	saveAs  string
	replace bool
}

// newOptions gives a command the flags of all choices and of the output.
func newOptions(c *cobra.Command) *options {
	o := &options{flags: c.Flags()}
	o.flags.SortFlags = false
	for _, k := range casefile.Keys() {
		if k.Name == "recording" {
			continue
		}
		flag := o.flags.VarPF(choice{k, &o.chosen}, k.Flag, "", k.Help)
		if k.Value == "" {
			flag.NoOptDefVal = "true"
		}
	}
	o.flags.BoolVar(&o.json, "json", false, "print one JSON object")
	o.flags.BoolVar(&o.ascii, "ascii", false, "print ASCII only")
	return o
}

// addSaving adds the flags of a note that is saved.
func (o *options) addSaving(c *cobra.Command) {
	c.Flags().StringVarP(&o.saveAs, "output", "o", "", "save the note to this file, which must not exist")
	c.Flags().BoolVar(&o.replace, "replace", false, "replace an existing file")
}

// over lays the flags over the choices of a case.
func (o *options) over(base casefile.Case) (casefile.Case, error) {
	if f := o.flags.Lookup("output"); f != nil && f.Changed && o.saveAs == "" {
		return base, usageError{errors.New("-o without a name"), "add the name of the file: -o FILE"}
	}
	if o.replace && o.saveAs == "" {
		return base, usageError{errors.New("--replace without -o"), "add -o FILE"}
	}
	return o.chosen.Over(base), nil
}

// given tells whether a flag stands on the command line.
func (o *options) given(flag string) bool {
	f := o.flags.Lookup(flag[len("--"):])
	return f != nil && f.Changed
}

func (o *options) render() casenote.Options { return casenote.Options{ASCII: o.ascii} }

// choice is the flag of one key of a case.
type choice struct {
	key casefile.Key
	to  *casefile.Case
}

// Set takes the value of a flag, once each time it stands on the command line.
func (c choice) Set(s string) error { return c.to.Set(c.key.Flag, s) }

// String is the default shown in help texts: none.
func (c choice) String() string { return "" }

// Type is what stands for the value in help texts.
func (c choice) Type() string { return c.key.Value }

var _ pflag.Value = choice{}
