package main

import (
	"github.com/spf13/cobra"
)

func (p *program) pageCommand() *cobra.Command {
	var out string
	cmd := &cobra.Command{
		Use:   "page --out FILE",
		Short: "Write the page that does the same without a command line",
		Long: `Writes the page: one HTML file that does the same work in a browser. It opens
by a double click, works with the network off, and keeps no score.`,
		Example: "  tailgap page --out tailgap.html",
		Args:    noArguments,

		ValidArgsFunction: cobra.NoFileCompletions,
		RunE: func(*cobra.Command, []string) error {
			if out == "" {
				return misuse("tailgap page", "say where to write the page: --out tailgap.html")
			}
			page, err := p.page()
			if err != nil {
				return failure(err)
			}
			return p.printOrWrite(out, page)
		},
	}
	fileFlag(cmd.Flags(), &out, "out", "write the page to this `FILE`; - is standard output", true)
	return cmd
}
