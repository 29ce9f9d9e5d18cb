package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"github.com/spf13/cobra"
	"offplumb/scenarios/published"
	"offplumb/sim/table"
)

// errUnheld ends a selfcheck with a check that is not held; its table has said
// so.
var errUnheld = &fail{exitBroken, errors.New("a check is not held")}

// checkFormats are the forms in which the checks are printed.
var checkFormats = map[string]func(io.Writer, []published.Result) error{"text": checkText, "csv": checkCSV, "markdown": checkMarkdown}

func newSelfcheck(s streams) *cobra.Command {
	format := "text"
	cmd := &cobra.Command{
		Use: "selfcheck", Short: "hold the program on this machine against published figures; print the table",
		Long: strings.TrimSpace(`
selfcheck runs scenarios whose results somebody published, through the same
code as run, and prints for each what was published and by whom, what this
program computes, the difference and the tolerance, which follows from the
source's precision. Exit status: 0 all held, 1 one is not held.`),
		Args: exactly(0, "no arguments"),
		RunE: func(cmd *cobra.Command, _ []string) error {
			write, ok := checkFormats[format]
			if !ok {
				return wrong(fmt.Errorf("--format: wants text, csv or markdown, got %q", format))
			}
			return selfcheck(cmd.Context(), s.out, write)
		},
	}
	cmd.Flags().StringVar(&format, "format", format, "`form` of the table: text, csv or markdown")
	return cmd
}

func selfcheck(ctx context.Context, w io.Writer, write func(io.Writer, []published.Result) error) error {
	results, err := published.Run(ctx, published.Checks())
	if ctx.Err() != nil {
		return context.Cause(ctx)
	}
	if err != nil {
		return incomplete(err)
	}
	if err := write(w, results); err != nil {
		return incomplete(err)
	}
	if len(unheld(results)) > 0 {
		return errUnheld
	}
	return nil
}

// unheld are the checks that are not held.
func unheld(results []published.Result) (out []*published.Result) {
	for i := range results {
		if !results[i].Held() {
			out = append(out, &results[i])
		}
	}
	return out
}

// checkCells are a check's cells: name, published, computed, unit, difference,
// tolerance, and whether it is held.
func checkCells(r *published.Result) []string {
	cells := []string{r.Name, short(r.Published, 10), "none", r.Unit, "none", short(r.Tolerance, 2), "held"}
	if r.Err == nil {
		cells[2], cells[4] = table.Fixed(r.Computed, pastTolerance(r.Tolerance)), "0"
		// Below the last bits of a sum there is no difference to tell.
		if d := r.Difference(); math.Abs(d) > 1e-14 {
			cells[4] = fmt.Sprintf("%+.2g", d)
		}
	}
	if !r.Held() {
		cells[6] = "NOT HELD"
	}
	return cells
}

// pastTolerance is how many decimals show a figure to a digit more than its
// tolerance.
func pastTolerance(tol float64) int { return max(0, 1-int(math.Floor(math.Log10(tol)))) }

// short writes a number with at most so many digits.
func short(x float64, digits int) string { return strconv.FormatFloat(x, 'g', digits, 64) }

var checkHead = []string{"figure", "published", "computed", "unit", "difference", "tolerance", ""}

func checkText(w io.Writer, results []published.Result) error {
	var b strings.Builder
	b.WriteString("Published figures, and what offplumb " + version + " computes on this machine\n")
	rows := [][]string{checkHead}
	for i := range results {
		rows = append(rows, checkCells(&results[i]))
	}
	lines := table.Align(rows, []bool{false, true, true, false, true, true, false})
	b.WriteString("\n    " + strings.TrimRight(lines[0], " ") + "\n")
	for i := range results {
		r := &results[i]
		if i == 0 || r.Group != results[i-1].Group {
			b.WriteString("\n" + r.Group + "\n")
		}
		if i == 0 || r.Source != results[i-1].Source || r.Group != results[i-1].Group {
			b.WriteString("  " + r.Source + "\n")
		}
		b.WriteString("    " + strings.TrimRight(lines[1+i], " ") + "\n")
		if r.Err != nil {
			b.WriteString("      " + r.Err.Error() + "\n")
		}
	}
	if bad := unheld(results); len(bad) > 0 {
		fmt.Fprintf(&b, "\n%s, %d of them NOT HELD.\n", count(len(results), "check"), len(bad))
	} else {
		fmt.Fprintf(&b, "\n%s, all held.\n", count(len(results), "check"))
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func checkMarkdown(w io.Writer, results []published.Result) error {
	var b strings.Builder
	b.WriteString("# Published checks\n\nWhat `offplumb selfcheck` computes beside what others published. A tolerance follows from the\n" +
		"digits that the source prints, or from how far measurements of the same thing lie apart. \"Seen\" says\n" +
		"that the figure was seen in its source, \"at second hand\" in a page that quotes it.\n")
	for i := range results {
		r := &results[i]
		if i == 0 || r.Group != results[i-1].Group {
			b.WriteString("\n### " + r.Group + "\n\n| source | figure | published | computed | unit | difference | tolerance | |\n| --- | --- | ---: | ---: | --- | ---: | ---: | --- |\n")
		}
		b.WriteString("| " + r.Source + " | " + strings.Join(checkCells(r), " | ") + " |\n")
	}
	_, err := io.WriteString(w, b.String())
	return err
}

func checkCSV(w io.Writer, results []published.Result) error {
	t := &table.Table{Columns: []table.Column{
		{Name: "check", Kind: table.Text}, {Name: "source", Kind: table.Text}, {Name: "figure", Kind: table.Text},
		{Name: "published"}, {Name: "computed"}, {Name: "unit", Kind: table.Text}, {Name: "difference"}, {Name: "tolerance"}, {Name: "held", Kind: table.Text}, {Name: "note", Kind: table.Text}}}
	for i := range results {
		r, held, note := &results[i], "yes", ""
		if !r.Held() {
			held = "no"
		}
		if r.Err != nil {
			note = r.Err.Error()
		}
		t.Add(table.Str(r.Group), table.Str(r.Source), table.Str(r.Name), table.Num(r.Published), table.Num(r.Computed), table.Str(r.Unit),
			table.Num(r.Difference()), table.Num(r.Tolerance), table.Str(held), table.Str(note))
	}
	return t.WriteCSV(w)
}
