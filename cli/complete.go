package main

import (
	"bytes"
	"os"
	"strings"

	"github.com/spf13/cobra"

	"tailgap/core/demo"
	"tailgap/core/intake"
	"tailgap/core/sample"
)

// completeJudge tells the shell what may follow the flags of judge; the rest
// are file names, which it completes by itself.
func completeJudge(cmd *cobra.Command) {
	fixed := func(flag string, values ...cobra.Completion) {
		cmd.RegisterFlagCompletionFunc(flag, cobra.FixedCompletions(values, cobra.ShellCompDirectiveNoFileComp))
	}
	fixed("format", "text\tone sentence for each cutoff, and tables", "json\teverything, for programs", "csv\tone line for each cutoff")
	fixed("header", "auto\tlook at the first row", "yes\tit names the columns", "no\tit is data")
	fixed("step", "auto\tas the scores show", "none\tthe scores have no step")
	fixed("cutoff", ">=\tat or above", ">\tabove", "<=\tat or below", "<\tbelow")
	for _, flag := range []string{"tolerance", "too-high", "too-low"} {
		fixed(flag, "1pt\tpercentage points", "20%count\ta part of the counted share", "40heads\tpeople, with --heads")
	}
	for _, flag := range []string{"missing", "range", "mean", "sd", "norm-n", "heads", "level", "replicates", "seed", "workers"} {
		fixed(flag)
	}
	cmd.RegisterFlagCompletionFunc("score", completeScore)
	cmd.MarkFlagFilename("figure", "svg")
	cmd.MarkFlagFilename("worm", "svg")
	cmd.MarkFlagFilename("question", "json")
	cmd.MarkFlagFilename("save-question", "json")
}

// completeScore offers the columns of the file that is already named.
func completeScore(cmd *cobra.Command, args []string, typed string) ([]cobra.Completion, cobra.ShellCompDirective) {
	offered := []cobra.Completion{}
	for _, column := range columnsNamed(cmd, args) {
		if column.Numeric && strings.HasPrefix(column.Ask, typed) {
			offered = append(offered, column.Ask)
		}
	}
	return offered, cobra.ShellCompDirectiveNoFileComp
}

func columnsNamed(cmd *cobra.Command, args []string) []intake.Column {
	source := intake.Source{Name: demo.Name, Reader: bytes.NewReader(demo.CSV())}
	if asked, _ := cmd.Flags().GetBool("demo"); !asked {
		if len(args) == 0 || args[0] == "-" {
			return nil
		}
		file, err := os.Open(args[0])
		if err != nil {
			return nil
		}
		defer file.Close()
		source = intake.Source{Name: args[0], Reader: file}
	}
	columns, _ := intake.Columns(cmd.Context(), source, sample.HeaderAuto)
	return columns
}
