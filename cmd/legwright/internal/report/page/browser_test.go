package page

import (
	"context"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"legwright/cmd/legwright/internal/sheet"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
)

// tab is the page in a browser, with what went wrong in it.
type tab struct {
	t    testing.TB
	ctx  context.Context
	path string // of the file

	mu       sync.Mutex
	faults   []string // console errors, exceptions, log entries
	requests []string // asked for, but for the page itself and what it holds
}

// chromium finds a browser. Without one the test is skipped, but fails where the variable
// LEGWRIGHT_CI says that one must be there.
func chromium(t testing.TB) string {
	t.Helper()
	if testing.Short() {
		t.Skip("a browser takes its time")
	}
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if path, err := exec.LookPath(name); err == nil {
			return path
		}
	}
	if os.Getenv("LEGWRIGHT_CI") == "1" {
		t.Fatal("no Chromium found; install the package chromium")
	}
	t.Skip("no Chromium found: install the package chromium to test the page in a browser")
	return ""
}

// browser is one browser for all tests of the package; each opens its own tab.
var browser struct {
	once sync.Once
	ctx  context.Context
	stop func()
	err  error
}

func TestMain(m *testing.M) {
	code := m.Run()
	if browser.stop != nil {
		browser.stop()
	}
	os.Exit(code)
}

func started(path string) (context.Context, error) {
	browser.once.Do(func() {
		options := append(chromedp.DefaultExecAllocatorOptions[:], chromedp.ExecPath(path), chromedp.NoSandbox, chromedp.DisableGPU,
			chromedp.Flag("disable-background-networking", true))
		allocator, end := chromedp.NewExecAllocator(context.Background(), options...)
		ctx, cancel := chromedp.NewContext(allocator, chromedp.WithErrorf(func(string, ...any) {}))
		browser.ctx, browser.stop = ctx, func() { cancel(); end() }
		browser.err = chromedp.Do(ctx)
	})
	return browser.ctx, browser.err
}

// open writes the page of the data to a file and opens it in a tab of the given size.
func open(t testing.TB, d *sheet.Data, width, height int64, dark bool) *tab {
	t.Helper()
	whole, err := started(chromium(t))
	if err != nil {
		t.Fatal(err)
	}
	b, err := WritePage(d)
	if err != nil {
		t.Fatal(err)
	}
	path := filepath.Join(t.TempDir(), "report.html")
	if err := os.WriteFile(path, b, 0o666); err != nil {
		t.Fatal(err)
	}
	ctx, cancel := chromedp.NewContext(whole)
	ctx, late := context.WithTimeout(ctx, 2*time.Minute)
	t.Cleanup(func() {
		late()
		cancel()
	})
	p := &tab{t: t, ctx: ctx, path: path}
	if err := chromedp.Listen(ctx, p.hear); err != nil {
		t.Fatal(err)
	}
	p.scheme(dark)
	p.do(chromedp.EmulateViewport(width, height), chromedp.Navigate("file://"+path), chromedp.WaitReady(chromedp.CSS("#foot p")))
	return p
}

func (p *tab) hear(event any) {
	p.mu.Lock()
	defer p.mu.Unlock()
	switch e := event.(type) {
	case *network.EventRequestWillBeSent:
		if e.Request.URL != "file://"+p.path && !strings.HasPrefix(e.Request.URL, "data:image/svg+xml;base64,") { // drawings of the page itself
			p.requests = append(p.requests, e.Request.URL)
		}
	case *runtime.EventExceptionThrown:
		p.faults = append(p.faults, e.ExceptionDetails.Text+" "+e.ExceptionDetails.Exception.Description)
	case *runtime.EventConsoleAPICalled:
		p.faults = append(p.faults, fmt.Sprint("console: ", e.Type))
	case *log.EventEntryAdded:
		p.faults = append(p.faults, e.Entry.Text)
	}
}

// quiet fails the test if the page complained or asked for anything.
func (p *tab) quiet() {
	p.t.Helper()
	p.mu.Lock()
	defer p.mu.Unlock()
	if len(p.faults) > 0 {
		p.t.Errorf("the page complains: %s", strings.Join(p.faults, "; "))
	}
	if len(p.requests) > 0 {
		p.t.Errorf("the page asks for %s", strings.Join(p.requests, ", "))
	}
}

func (p *tab) scheme(dark bool) {
	p.t.Helper()
	scheme := "light"
	if dark {
		scheme = "dark"
	}
	params := emulation.SetEmulatedMediaParams{Features: []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: scheme}}}
	if _, err := chromedp.Call(p.ctx, emulation.SetEmulatedMedia, params); err != nil {
		p.t.Fatal(err)
	}
}

func (p *tab) do(steps ...chromedp.Action[chromedp.Void]) {
	p.t.Helper()
	if err := chromedp.Do(p.ctx, steps...); err != nil {
		p.mu.Lock()
		defer p.mu.Unlock()
		p.t.Fatalf("%v (page: %s)", err, strings.Join(p.faults, "; "))
	}
}

// eval is the value of a JavaScript expression in the page.
func eval[T any](p *tab, expression string, options ...chromedp.EvaluateOption) T {
	p.t.Helper()
	v, err := chromedp.Run(p.ctx, chromedp.Evaluate[T](expression, options...))
	if err != nil {
		p.t.Fatalf("%s: %v", expression, err)
	}
	return v
}

// awaited waits for the promise that an expression gives.
var awaited = chromedp.EvalAwaitPromise
