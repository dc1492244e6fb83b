package main

import (
	"fmt"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
)

// helpWidth is where help wraps.
const helpWidth = 100

// groupOf is the annotation that puts a flag under a heading.
const groupOf = "group"

// help prints what a command does, examples first: they are what one copies.
func (p *program) help(cmd *cobra.Command, _ []string) {
	cmd.InitDefaultHelpFlag()
	var text strings.Builder
	fmt.Fprintf(&text, "%s\n", strings.TrimSpace(cmd.Long))
	fmt.Fprintf(&text, "\nUsage:\n  %s\n", cmd.UseLine())
	if cmd.Example != "" {
		fmt.Fprintf(&text, "\nExamples:\n%s\n", cmd.Example)
	}
	if cmd.HasAvailableSubCommands() {
		text.WriteString("\nCommands:\n")
		for _, sub := range cmd.Commands() {
			if sub.IsAvailableCommand() {
				fmt.Fprintf(&text, "  %-12s %s\n", sub.Name(), sub.Short)
			}
		}
	}
	for _, group := range flagGroups(cmd) {
		fmt.Fprintf(&text, "\n%s:\n%s", group.title, group.flags.FlagUsagesWrapped(helpWidth))
	}
	p.unwritten = p.print([]byte(text.String()))
}

type flagGroup struct {
	title string
	flags *pflag.FlagSet
}

// flagGroups sorts a command's flags under their headings, headings and flags
// in the order of declaration.
func flagGroups(cmd *cobra.Command) []*flagGroup {
	var groups []*flagGroup
	in := func(title string) *pflag.FlagSet {
		for _, group := range groups {
			if group.title == title {
				return group.flags
			}
		}
		set := pflag.NewFlagSet(title, pflag.ContinueOnError)
		set.SortFlags = false
		groups = append(groups, &flagGroup{title, set})
		return set
	}
	local := cmd.LocalFlags()
	local.SortFlags = false
	local.VisitAll(func(flag *pflag.Flag) {
		title := "Flags"
		if given := flag.Annotations[groupOf]; given != nil {
			title = given[0]
		}
		if !flag.Hidden {
			in(title).AddFlag(flag)
		}
	})
	return groups
}
