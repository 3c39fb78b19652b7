// Package cli is the command line: one file a command, each with its flags, its options and the function that runs it.
//
// Results go to stdout, messages and progress to stderr. Errors are printed in one place, [Main]'s run, which also turns them into the
// exit code. Nothing is left half written: what a command writes is built aside and put in place at the end.
package cli
