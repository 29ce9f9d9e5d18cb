package main

import (
	"context"
	"fmt"
	"net/url"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/cdproto/cdp"
	"github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
)

// browserPatience ends a step that hangs. On an idle machine a step takes
// milliseconds.
const browserPatience = time.Minute

// tab is a page of a browser, and what it complained of.
type tab struct {
	context.Context
	mu       sync.Mutex
	faults   []string
	requests []string
}

// browse starts a browser. Without one the test is skipped, unless
// OFFPLUMB_BROWSER=required.
func browse(t *testing.T) *tab {
	t.Helper()
	path := ""
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if p, err := exec.LookPath(name); err == nil {
			path = p
			break
		}
	}
	if path == "" {
		if os.Getenv("OFFPLUMB_BROWSER") == "required" {
			t.Fatal("there is no chromium, and OFFPLUMB_BROWSER=required")
		}
		t.Skip("there is no chromium")
	}
	opts := append(chromedp.DefaultExecAllocatorOptions[:], chromedp.ExecPath(path), chromedp.NoSandbox, chromedp.DisableGPU,
		chromedp.Flag("disable-quic", true), chromedp.Flag("disable-component-update", true), chromedp.UserDataDir(t.TempDir()),
		chromedp.WSURLReadTimeout(time.Minute))
	ctx, stop := chromedp.NewExecAllocator(context.Background(), opts...)
	t.Cleanup(stop)
	ctx, shut := chromedp.NewContext(ctx)
	t.Cleanup(shut)
	b := &tab{Context: ctx}
	if err := chromedp.Listen(ctx, b.listen); err != nil {
		t.Fatal(err)
	}
	call(t, b, network.Enable, network.EnableParams{})
	call(t, b, log.Enable, cdp.Empty{})
	call(t, b, runtime.Enable, cdp.Empty{})
	return b
}

// listen notes errors of scripts, of the policy and of the network, and every
// request.
func (b *tab) listen(ev any) {
	b.mu.Lock()
	defer b.mu.Unlock()
	switch ev := ev.(type) {
	case *runtime.EventExceptionThrown:
		b.faults = append(b.faults, ev.ExceptionDetails.Text)
	case *runtime.EventConsoleAPICalled:
		if ev.Type == runtime.ConsoleAPICalledTypeError || ev.Type == runtime.ConsoleAPICalledTypeWarning {
			b.faults = append(b.faults, fmt.Sprintf("console: %s", ev.Args[0].Value))
		}
	case *log.EventEntryAdded:
		b.faults = append(b.faults, ev.Entry.Text)
	case *network.EventRequestWillBeSent:
		b.requests = append(b.requests, ev.Request.URL)
	}
}

// call gives the browser a command.
func call[P, R any](t *testing.T, b *tab, c cdp.Command[P, R], params P) {
	t.Helper()
	ctx, cancel := context.WithTimeout(b, browserPatience)
	defer cancel()
	if _, err := chromedp.Call(ctx, c, params); err != nil {
		t.Fatal(err)
	}
}

func (b *tab) do(t *testing.T, steps ...chromedp.Action[chromedp.Void]) {
	t.Helper()
	ctx, cancel := context.WithTimeout(b, browserPatience)
	defer cancel()
	if err := chromedp.Do(ctx, steps...); err != nil {
		t.Fatal(err)
	}
}

// open opens a file and wants nothing but that file to be asked for.
func (b *tab) open(t *testing.T, file string) {
	t.Helper()
	b.mu.Lock()
	b.faults, b.requests = nil, nil
	b.mu.Unlock()
	to := (&url.URL{Scheme: "file", Path: filepath.ToSlash(file)}).String()
	b.do(t, chromedp.Navigate(to), chromedp.WaitReady("footer"))
	b.quiet(t, to)
}

func (b *tab) quiet(t *testing.T, only string) {
	t.Helper()
	b.mu.Lock()
	defer b.mu.Unlock()
	for _, f := range b.faults {
		t.Errorf("the browser says: %s", f)
	}
	for _, r := range b.requests {
		if r != only && !strings.HasPrefix(r, "data:") {
			t.Errorf("the page asks for %s", r)
		}
	}
}

// silent wants the browser not to have complained.
func (b *tab) silent(t *testing.T) {
	t.Helper()
	b.mu.Lock()
	defer b.mu.Unlock()
	for _, f := range b.faults {
		t.Errorf("the browser says: %s", f)
	}
}

func eval[T any](t *testing.T, b *tab, script string) T {
	t.Helper()
	return result(t, b, chromedp.Evaluate[T](script, chromedp.EvalAwaitPromise))
}

func result[T any](t *testing.T, b *tab, a chromedp.Action[T]) T {
	t.Helper()
	ctx, cancel := context.WithTimeout(b, browserPatience)
	defer cancel()
	out, err := chromedp.Run(ctx, a)
	if err != nil {
		t.Fatal(err)
	}
	return out
}
