package main

import (
	"github.com/spf13/cobra"
)

// newCompletion returns the command that writes completions for a shell.
func newCompletion(p *program) *cobra.Command {
	shells := map[string]func(root *cobra.Command) error{
		"bash":       func(root *cobra.Command) error { return root.GenBashCompletionV2(p.out, true) },
		"fish":       func(root *cobra.Command) error { return root.GenFishCompletion(p.out, true) },
		"powershell": func(root *cobra.Command) error { return root.GenPowerShellCompletionWithDesc(p.out) },
		"zsh":        func(root *cobra.Command) error { return root.GenZshCompletion(p.out) },
	}
	names := []string{"bash", "fish", "powershell", "zsh"}
	return &cobra.Command{
		Use:   "completion SHELL",
		Short: "write completions for a shell",
		Long: `Write a script that completes commands and flags, for bash, fish, powershell or
zsh. It goes into a file that the shell reads at its start.`,
		Example: `  emendary completion bash > emendary.bash
  emendary completion zsh > _emendary`,
		ValidArgs: names,
		Args:      oneOf("shell", names),
		RunE: func(cmd *cobra.Command, args []string) error {
			return shells[args[0]](cmd.Root())
		},
	}
}
