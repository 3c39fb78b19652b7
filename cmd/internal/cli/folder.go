package cli

import (
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"standfast/cmd/internal/report"
)

// resultName is the file by which a folder of ours is known.
const resultName = "result.json"

// witnessesName is the file of the certificates.
const witnessesName = "witnesses.json"

// output is a file to be written.
type output struct {
	name  string
	write func(io.Writer) error
}

// checkFolder returns an error of the user's if a folder of results may not stand at path: its parent is missing, it is no folder, it
// is or holds the working folder, or it holds what no earlier run wrote.
func checkFolder(path string) error {
	parent := filepath.Dir(filepath.Clean(path))
	if info, err := os.Stat(parent); err != nil || !info.IsDir() {
		return usagef("--out %s: there is no folder %s", path, parent)
	}
	info, err := os.Stat(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return nil
	case err != nil:
		return err
	case !info.IsDir():
		return usagef("--out %s: is a file, not a folder", path)
	}
	if inside, err := holdsWorkingFolder(path); err != nil || inside {
		return errors.Join(err, usagef("--out %s: is or holds the folder you work in, which cannot be replaced; name another", path))
	}
	entries, err := os.ReadDir(path)
	if err != nil || len(entries) == 0 {
		return err
	}
	ours, err := report.Read(filepath.Join(path, resultName))
	if err != nil {
		return usagef("--out %s: holds something else than results of standfast; name another folder or empty this one", path)
	}
	for _, e := range entries {
		if e.IsDir() || !slices.Contains(ours.Files, e.Name()) {
			return usagef("--out %s: holds %s, which standfast did not write; move it elsewhere first", path, e.Name())
		}
	}
	return nil
}

// holdsWorkingFolder reports whether the working folder is path or lies below it.
func holdsWorkingFolder(path string) (bool, error) {
	target, err := filepath.Abs(path)
	if err != nil {
		return false, err
	}
	if target, err = filepath.EvalSymlinks(target); err != nil {
		return false, err
	}
	work, err := os.Getwd()
	if err != nil {
		return false, err
	}
	if work, err = filepath.EvalSymlinks(work); err != nil {
		return false, err
	}
	rel, err := filepath.Rel(target, work)
	return err == nil && rel != ".." && !strings.HasPrefix(rel, ".."+string(filepath.Separator)), nil
}

// writeFolder writes the outputs to a new folder beside path and puts it in the place of whatever results stand there. When it returns an
// error, or the context has ended, path is as it was and nothing else is left behind.
func writeFolder(ctx context.Context, path string, outputs []output) (err error) {
	if real, err := filepath.EvalSymlinks(path); err == nil {
		path = real // The folder behind a link is replaced, not the link.
	}
	aside, err := os.MkdirTemp(filepath.Dir(filepath.Clean(path)), ".standfast-*")
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, os.RemoveAll(aside)) }()
	fresh := filepath.Join(aside, "new")
	if err := os.Mkdir(fresh, 0o777); err != nil {
		return err
	}
	if err := writeAll(ctx, fresh, outputs); err != nil {
		return err
	}
	if err := checkFolder(path); err != nil { // Somebody may have put something there since.
		return err
	}
	return swap(path, fresh, filepath.Join(aside, "old"))
}

// swap moves fresh to path and what stands there to old; if the second move fails, the first is undone.
func swap(path, fresh, old string) error {
	err := os.Rename(path, old)
	if err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	had := err == nil
	if err := os.Rename(fresh, path); err != nil {
		if had {
			err = errors.Join(err, os.Rename(old, path))
		}
		return err
	}
	return nil
}

// writeAmong writes the outputs to an existing folder among what stands there: all are complete before the first is moved into place.
func writeAmong(ctx context.Context, folder string, outputs []output) (err error) {
	aside, err := os.MkdirTemp(folder, ".standfast-*")
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, os.RemoveAll(aside)) }()
	if err := writeAll(ctx, aside, outputs); err != nil {
		return err
	}
	for _, o := range outputs {
		if err := os.Rename(filepath.Join(aside, o.name), filepath.Join(folder, o.name)); err != nil {
			return err
		}
	}
	return nil
}

// writeAll writes the outputs to a folder, until the context ends.
func writeAll(ctx context.Context, folder string, outputs []output) error {
	for _, o := range outputs {
		if err := ctx.Err(); err != nil {
			return err
		}
		if err := writeFile(filepath.Join(folder, o.name), o.write); err != nil {
			return err
		}
	}
	return ctx.Err()
}

func outputNames(outputs []output) []string {
	names := make([]string, len(outputs))
	for i, o := range outputs {
		names[i] = o.name
	}
	return names
}

// writeFile creates a file and writes it.
func writeFile(path string, write func(io.Writer) error) error {
	f, err := os.Create(path)
	if err != nil {
		return err
	}
	if err := errors.Join(write(f), f.Close()); err != nil {
		return fmt.Errorf("%s: %w", filepath.Base(path), err)
	}
	return nil
}
