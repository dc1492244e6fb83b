package main

import (
	"errors"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"tailgap/core/ask"
)

func (p *program) root() *cobra.Command {
	root := &cobra.Command{
		Use:   "tailgap COMMAND",
		Short: "How far are a normal curve's percentages from the people counted?",
		Long: `tailgap finds out how far the percentages read from a normal curve are from
the people counted, at the cutoffs that matter, how sure that is, and whether
it is close enough for what hangs on it. The scores never leave this machine.`,
		Example: `  tailgap judge --demo
  tailgap judge scores.csv --score vocabulary --cutoff '<=11' --tolerance 1pt
  tailgap page --out tailgap.html`,
		Version:       ask.Program,
		Args:          cobra.ArbitraryArgs,
		SilenceErrors: true,
		SilenceUsage:  true,
		RunE: func(cmd *cobra.Command, args []string) error {
			if len(args) > 0 {
				return misuse("tailgap", "there is no command %.40q; the commands are judge, demo, page, version and completion", args[0])
			}
			return cmd.Help()
		},
	}
	root.SetIn(p.stdin)
	root.SetOut(p.stdout)
	root.SetErr(p.stderr)
	root.SetVersionTemplate("{{.Version}}\n")
	root.SetFlagErrorFunc(flagError)
	root.SetHelpFunc(p.help)
	root.SetHelpCommand(helpCommand())
	root.AddCommand(p.judgeCommand(), p.demoCommand(), p.pageCommand(), p.versionCommand())
	return root
}

func (p *program) versionCommand() *cobra.Command {
	return &cobra.Command{
		Use:     "version",
		Short:   "Say which version this is",
		Long:    "Says which version this is. Every answer names the version that gave it.",
		Example: "  tailgap version",
		Args:    noArguments,

		ValidArgsFunction: cobra.NoFileCompletions,
		RunE: func(*cobra.Command, []string) error {
			return p.print([]byte(ask.Program + "\n"))
		},
	}
}

// noArguments refuses anything but flags.
func noArguments(cmd *cobra.Command, args []string) error {
	if len(args) > 0 {
		return misuse(cmd.CommandPath(), "%s takes no %.40q; it has flags only", cmd.CommandPath(), args[0])
	}
	return nil
}

// flagError says in a sentence what is wrong with a flag.
func flagError(cmd *cobra.Command, err error) error {
	var (
		unknown   *pflag.NotExistError
		valueless *pflag.ValueRequiredError
		invalid   *pflag.InvalidValueError
		command   = cmd.CommandPath()
	)
	switch {
	case errors.Is(err, pflag.ErrHelp):
		return err
	case errors.As(err, &unknown):
		dashes := "--"
		if unknown.GetSpecifiedShortnames() != "" {
			dashes = "-"
		}
		return misuse(command, "%s has no flag %s%.40s", command, dashes, unknown.GetSpecifiedName())
	case errors.As(err, &valueless):
		name := valueless.GetSpecifiedName()
		if name == "cutoff" {
			return misuse(command, "--cutoff needs a value, in quotes to keep it from the shell: --cutoff '>=70'")
		}
		return misuse(command, "--%s needs a value", name)
	case errors.As(err, &invalid):
		return misuse(command, "%w", invalid.Unwrap())
	}
	return misuse(command, "%w", err)
}

func helpCommand() *cobra.Command {
	return &cobra.Command{
		Use:     "help [COMMAND]",
		Short:   "Explain a command",
		Long:    "Explains a command, as COMMAND --help does.",
		Example: "  tailgap help judge",
		RunE: func(cmd *cobra.Command, args []string) error {
			about, rest, err := cmd.Root().Find(args)
			if err != nil || len(rest) > 0 {
				return misuse("tailgap", "there is no command %.40q to explain", strings.Join(args, " "))
			}
			return about.Help()
		},
	}
}
