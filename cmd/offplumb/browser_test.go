package main

import (
	"context"
	"os"
	"os/exec"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
)

// browser is a tab of a new Chromium and what its console said.
type browser struct {
	ctx  context.Context
	mu   sync.Mutex
	said []string
}

// newBrowser starts Chromium with an empty profile. Without one the test is skipped, unless
// OFFPLUMB_BROWSER=required.
func newBrowser(t *testing.T) *browser {
	t.Helper()
	path, err := exec.LookPath("chromium")
	if err != nil {
		if os.Getenv("OFFPLUMB_BROWSER") == "required" {
			t.Fatal("no chromium, and OFFPLUMB_BROWSER=required")
		}
		t.Skip("no chromium")
	}
	flags := []chromedp.ExecAllocatorOption{chromedp.ExecPath(path), chromedp.NoFirstRun, chromedp.Headless, chromedp.NoSandbox,
		chromedp.UserDataDir(t.TempDir()), chromedp.WindowSize(1000, 900), chromedp.Flag("hide-scrollbars", true)}
	for _, f := range []string{"disable-gpu", "disable-quic", "disable-background-networking", "disable-component-update", "disable-sync"} {
		flags = append(flags, chromedp.Flag(f, true))
	}
	alloc, stop := chromedp.NewExecAllocator(context.Background(), flags...)
	ctx, cancel := chromedp.NewContext(alloc)
	b := &browser{ctx: ctx}
	t.Cleanup(func() {
		_ = chromedp.Cancel(ctx) // waits for the browser to end, so that its profile can be removed
		cancel()
		stop()
	})
	if err := chromedp.Listen(ctx, b.listen); err != nil {
		t.Fatal(err)
	}
	return b
}

func (b *browser) listen(ev any) {
	b.mu.Lock()
	defer b.mu.Unlock()
	switch e := ev.(type) {
	case *runtime.EventExceptionThrown:
		words := e.ExceptionDetails.Text
		if x := e.ExceptionDetails.Exception; x != nil {
			words += " " + x.Description
		}
		b.said = append(b.said, words)
	case *runtime.EventConsoleAPICalled:
		b.said = append(b.said, "console."+string(e.Type))
	case *log.EventEntryAdded:
		b.said = append(b.said, e.Entry.Text)
	}
}

// patience is how long a browser may take over one action on a busy machine.
const patience = 20 * time.Second

// run1 runs an action and gives its value.
func run1[T any](t *testing.T, b *browser, action chromedp.Action[T]) T {
	t.Helper()
	ctx, cancel := context.WithTimeout(b.ctx, patience)
	defer cancel()
	v, err := chromedp.Run(ctx, action)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// do runs steps, one after the other.
func (b *browser) do(t *testing.T, steps ...chromedp.Action[chromedp.Void]) {
	t.Helper()
	ctx, cancel := context.WithTimeout(b.ctx, patience)
	defer cancel()
	if err := chromedp.Do(ctx, steps...); err != nil {
		t.Fatal(err)
	}
}

// quiet fails if the console said anything: of the policy, of an error, of anything.
func (b *browser) quiet(t *testing.T) {
	t.Helper()
	b.mu.Lock()
	defer b.mu.Unlock()
	if len(b.said) > 0 {
		t.Errorf("the console says: %s", strings.Join(b.said, "\n"))
	}
}
