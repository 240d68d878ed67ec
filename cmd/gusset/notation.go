package main

import "github.com/spf13/cobra"

func notationCommand(t *terminal) *cobra.Command { return &cobra.Command{Use: "notation"} }
