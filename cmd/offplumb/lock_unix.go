//go:build darwin || dragonfly || freebsd || linux || netbsd || openbsd

package main

import (
	"errors"
	"io"
	"os"
	"path/filepath"
	"syscall"
)

// lockFolder locks a folder, until the lock is closed or the program ends,
// however that ends. The error is errLocked where another program has it.
func lockFolder(dir string) (io.Closer, error) {
	f, err := os.Open(dir)
	if err != nil {
		return nil, err
	}
	err = syscall.Flock(int(f.Fd()), syscall.LOCK_EX|syscall.LOCK_NB)
	if err == nil {
		return f, nil
	}
	f.Close()
	if errors.Is(err, syscall.EWOULDBLOCK) {
		return nil, errLocked
	}
	return nil, err
}

// isMount says whether another file system begins at a folder.
func isMount(dir string) bool {
	var here, above syscall.Stat_t
	return syscall.Stat(dir, &here) == nil && syscall.Stat(filepath.Dir(dir), &above) == nil && here.Dev != above.Dev
}
