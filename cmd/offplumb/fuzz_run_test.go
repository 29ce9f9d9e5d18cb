package main

import (
	"bytes"
	"context"
	"encoding/csv"
	"encoding/json"
	"encoding/xml"
	"errors"
	"flag"
	"io"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"
	"time"
)

// runBudget is far beyond what any scenario of the dice takes: what exceeds it
// hangs.
const runBudget = 2 * time.Minute

// FuzzRun does whole runs of scenarios made of bytes, with figures and report.
// A run ends with a status that is documented, writes nothing outside its
// folder, and all that it writes can be read.
func FuzzRun(f *testing.F) {
	for _, s := range []string{"", "ring", "torus with a map", "\x01\x02\x03\x04\x05\x06\x07\x08", "\xff\xff\xff\xff\xff\xff\xff\xff\xff\xff"} {
		f.Add([]byte(s))
	}
	f.Fuzz(checkRun)
}

var diceRuns = flag.Int("dice", 6, "how many random scenarios are run")

// TestRunDice is FuzzRun without a fuzzer, which is many times as fast.
func TestRunDice(t *testing.T) {
	for i := range *diceRuns {
		src := strconv.AppendInt([]byte("run "), int64(i), 10)
		t.Run(string(src), func(t *testing.T) { checkRun(t, src) })
	}
}

func checkRun(t *testing.T, src []byte) {
	dir := t.TempDir()
	toml, list := scenarioOfDice(src)
	keep(t, filepath.Join(dir, "s.toml"), toml)
	keep(t, filepath.Join(dir, "list.csv"), list)
	out := filepath.Join(dir, "out")
	status, words := runFor(runBudget, "run", filepath.Join(dir, "s.toml"), "--out", out)
	if status < exitDone || status > exitIncomplete {
		t.Fatalf("exit status %d of\n%s\n%s", status, toml, words)
	}
	t.Logf("status %d", status)
	if strings.ContainsFunc(words, func(r rune) bool { return r < ' ' && r != '\n' || r == 0x7f }) {
		t.Errorf("control characters in %q", words)
	}
	inFolder(t, dir, status, words)
	if status > exitBroken {
		return
	}
	if err := readable(out); err != nil {
		t.Errorf("%v\n%s", err, toml)
	}
	files, _, _ := knownOfRun(out)
	if name, err := stranger(out, files); err != nil || name != "" {
		t.Errorf("run.json does not name %q %v", name, err)
	}
}

func keep(t testing.TB, path, text string) {
	t.Helper()
	if err := os.WriteFile(path, []byte(text), 0o666); err != nil {
		t.Fatal(err)
	}
}

// runFor runs the program; -1: it takes longer than it may.
func runFor(budget time.Duration, args ...string) (code int, words string) {
	ctx, stop := context.WithTimeout(context.Background(), budget)
	defer stop()
	var b bytes.Buffer
	root := newRoot(streams{strings.NewReader(""), &b, &b})
	root.SetArgs(args)
	code = status(root.ExecuteContext(ctx), &b)
	if errors.Is(ctx.Err(), context.DeadlineExceeded) {
		code = -1
	}
	return code, b.String()
}

// inFolder holds that a run left what its status says and nothing else.
func inFolder(t *testing.T, dir string, status int, words string) {
	t.Helper()
	got, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	want := map[int][]string{exitDone: {"list.csv", "out", "s.toml"}, exitWrong: {"list.csv", "s.toml"}, exitIncomplete: {"list.csv", "out.partial", "s.toml"}}
	want[exitBroken] = want[exitDone]
	var names []string
	for _, e := range got {
		names = append(names, e.Name())
	}
	if !slices.Equal(names, want[status]) {
		t.Errorf("status %d left %q, want %q: %s", status, names, want[status], words)
	}
}

// readable reads all files of an output folder by their kinds.
func readable(dir string) error {
	columns, err := columnsOf(filepath.Join(dir, "datapackage.json"))
	if err != nil {
		return err
	}
	files, err := contents(dir)
	if err != nil {
		return err
	}
	for name, data := range files {
		if err := reads(name, data, columns[filepath.ToSlash(name)]); err != nil {
			return errors.New(name + ": " + err.Error())
		}
	}
	return nil
}

func reads(name string, data []byte, columns []string) error {
	switch filepath.Ext(name) {
	case ".csv":
		rows, err := csv.NewReader(bytes.NewReader(data)).ReadAll()
		if err != nil {
			return err
		}
		if len(rows) == 0 || !slices.Equal(rows[0], columns) {
			return errors.New("its header is not that of datapackage.json")
		}
	case ".json":
		if !json.Valid(data) {
			return errors.New("is not JSON")
		}
	case ".svg":
		return readsXML(data)
	case ".html":
		return readsXML(closed(data))
	default:
		return errors.New("is of no kind that is known")
	}
	return nil
}

// columnsOf gives the columns of each table of a data package.
func columnsOf(path string) (map[string][]string, error) {
	src, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	var p struct {
		Resources []struct {
			Path   string
			Schema struct{ Fields []struct{ Name string } }
		}
	}
	if err := json.Unmarshal(src, &p); err != nil {
		return nil, err
	}
	out := map[string][]string{}
	for _, r := range p.Resources {
		for _, f := range r.Schema.Fields {
			out[r.Path] = append(out[r.Path], f.Name)
		}
	}
	return out, nil
}

func readsXML(data []byte) error {
	d := xml.NewDecoder(bytes.NewReader(data))
	d.Entity = xml.HTMLEntity
	for {
		if _, err := d.Token(); errors.Is(err, io.EOF) {
			return nil
		} else if err != nil {
			return err
		}
	}
}

var (
	inlineCode = regexp.MustCompile(`(?s)<(script|style)\b[^>]*>.*?</(script|style)>`)
	voidTag    = regexp.MustCompile(`<(meta|link|input|br|hr|img|col|wbr)\b([^>]*?)/?>`)
	bareFlag   = regexp.MustCompile(` (hidden|open|checked|selected|disabled|controls|data-film-live|data-film-still|defer|required|multiple)(=""|\b)`)
)

// closed makes XML of a page of ours: what HTML leaves open is closed.
func closed(page []byte) []byte {
	page = inlineCode.ReplaceAll(page, nil)
	page = voidTag.ReplaceAll(page, []byte("<$1$2/>"))
	page = bytes.Replace(page, []byte("<!doctype html>"), nil, 1)
	return bareInTags(page)
}

var tag = regexp.MustCompile(`<[a-z][^<>]*>`)

func bareInTags(page []byte) []byte {
	return tag.ReplaceAllFunc(page, func(t []byte) []byte { return bareFlag.ReplaceAll(t, nil) })
}

// TestDiceMakeScenarios: what the fuzzer runs is valid for the most part, else
// it tries little.
func TestDiceMakeScenarios(t *testing.T) {
	const tries = 40
	taken, first := 0, ""
	for i := range tries {
		dir := t.TempDir()
		toml, list := scenarioOfDice([]byte{byte(i), byte(i * 7)})
		keep(t, filepath.Join(dir, "s.toml"), toml)
		keep(t, filepath.Join(dir, "list.csv"), list)
		if status, words := runFor(runBudget, "check", filepath.Join(dir, "s.toml")); status == exitDone {
			taken++
		} else {
			first += words
		}
	}
	t.Logf("%d of %d are taken", taken, tries)
	if taken < tries/2 {
		t.Errorf("%d of %d are taken:\n%s", taken, tries, first)
	}
}
