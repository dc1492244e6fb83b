package main

import (
	"github.com/spf13/cobra"

	"tailgap/core/demo"
)

func (p *program) demoCommand() *cobra.Command {
	var out string
	cmd := &cobra.Command{
		Use:   "demo",
		Short: "Write the demo data",
		Long: `Writes the made-up data of an adult reading programme as a CSV file, to try
tailgap on and to see the form of a file that it reads. No real person is in it.`,
		Example: `  tailgap demo --out demo.csv
  tailgap demo | head`,
		Args: noArguments,

		ValidArgsFunction: cobra.NoFileCompletions,
		RunE:              func(*cobra.Command, []string) error { return p.printOrWrite(out, demo.CSV()) },
	}
	fileFlag(cmd.Flags(), &out, "out", "write to this `FILE` instead of standard output", true)
	return cmd
}
