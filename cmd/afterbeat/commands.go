package main

import (
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"

	"github.com/spf13/cobra"

	"afterbeat/data/casenote"
	"afterbeat/data/save"
	"afterbeat/tree/study"
)

// compute opens what args name and runs the study up to and with the stage last.
func compute(ctx context.Context, s stream, o *options, args []string, last study.Stage) (study.Study, error) {
	path := ""
	if len(args) > 0 {
		path = args[0]
	}
	from, err := openPath(path, interruptible{ctx, s.in})
	if err != nil {
		return study.Study{}, err
	}
	in, err := from.inputs(o)
	if err != nil {
		return study.Study{}, err
	}
	st, err := study.Run(ctx, in, last)
	return st, from.located(err, o)
}

// checkCommand is `afterbeat check PATH`.
func checkCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "check PATH",
		Short: "What is in the recording, is it usable, its beats and indices",
		Long:  casenote.Caution + "\n\nSays what is in a recording, whether it is usable, and its beats and indices.",
		Args:  exactly(1, "one PATH"),
	}
	o := newOptions(c)
	c.RunE = func(c *cobra.Command, args []string) error {
		st, err := compute(c.Context(), s, o, args, study.StageBeats)
		if err != nil {
			return err
		}
		report := st.Beats.Check(st.Warnings())
		return o.print(s, report, st.CheckNote(), report.Reason)
	}
	return c
}

// fitCommand is `afterbeat fit PATH`.
func fitCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "fit PATH",
		Short: "Beats, then all models and estimators, side by side",
		Long:  casenote.Caution + "\n\nFinds the beats, fits all models to the average beat, and sets them side by side.",
		Args:  exactly(1, "one PATH"),
	}
	o := newOptions(c)
	c.RunE = func(c *cobra.Command, args []string) error {
		st, err := compute(c.Context(), s, o, args, study.StageFit)
		if err != nil {
			return err
		}
		report := st.FitReport()
		return o.print(s, report, st.FitNote(), report.Reason)
	}
	return c
}

// studyCommand is `afterbeat study PATH`.
func studyCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "study PATH",
		Short: "The whole run; prints the note, or saves it with -o",
		Long:  casenote.Caution + "\n\nRuns the whole study and prints its note; -o FILE saves it, never over an\nexisting file without --replace.",
		Args:  exactly(1, "one PATH"),
	}
	o := newOptions(c)
	o.addSaving(c)
	c.RunE = func(c *cobra.Command, args []string) error {
		st, err := compute(c.Context(), s, o, args, study.StageDone)
		if err != nil {
			return err
		}
		return o.deliver(s, st)
	}
	return c
}

// runScreenless is `afterbeat [PATH]` where no screen can be opened: it prints
// the note of the case, and says so.
func runScreenless(ctx context.Context, s stream, o *options, args []string) error {
	st, err := compute(ctx, s, o, args, study.StageDone)
	if err != nil {
		return err
	}
	what := "the demo case, whose data are invented"
	if len(args) > 0 {
		what = st.Inputs.Recording.Name.String()
	}
	fmt.Fprintf(s.err, "afterbeat: no screen is opened; this is the note of %s\n", what)
	return o.deliver(s, st)
}

// deliver prints or saves what a whole study gives.
func (o *options) deliver(s stream, st study.Study) error {
	if o.saveAs == "" {
		return o.print(s, st.Report(o.render()), st.Note(), st.Reason())
	}
	note := study.Text(st.Note(), o.render())
	if err := save.File(o.saveAs, []byte(note), o.replace); err != nil {
		return err
	}
	fmt.Fprintf(s.err, "afterbeat: note saved to %s\n", message(errors.New(o.saveAs)))
	if o.json {
		if err := printJSON(s.out, st.Report(o.render())); err != nil {
			return err
		}
	}
	return unanswered(st.Reason())
}

// print writes a result, as JSON or as text, and returns why it is no answer
// where it is none.
func (o *options) print(s stream, report any, note casenote.Note, reason *string) error {
	if o.json {
		if err := printJSON(s.out, report); err != nil {
			return err
		}
	} else if _, err := io.WriteString(s.out, study.Text(note, o.render())); err != nil {
		return err
	}
	return unanswered(reason)
}

func unanswered(reason *string) error {
	if reason == nil {
		return nil
	}
	return noAnswer{*reason}
}

func printJSON(w io.Writer, report any) error {
	e := json.NewEncoder(w)
	e.SetIndent("", "  ")
	e.SetEscapeHTML(false)
	return e.Encode(report)
}
