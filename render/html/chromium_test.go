package html_test

import (
	"context"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/cdproto/cdp"
	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/network"
	cdpruntime "github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
)

// browser starts a headless Chromium. Where there is none the test is skipped,
// and fails on the build server.
func browser(t *testing.T) context.Context {
	t.Helper()
	path := ""
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if p, err := exec.LookPath(name); err == nil {
			path = p
			break
		}
	}
	if path == "" {
		if os.Getenv("CI") == "true" {
			t.Fatal("no Chromium")
		}
		t.Skip("no Chromium")
	}
	opts := []chromedp.ExecAllocatorOption{
		chromedp.ExecPath(path), chromedp.NoSandbox, chromedp.DisableGPU, chromedp.NoFirstRun, chromedp.UserDataDir(t.TempDir()),
		chromedp.WSURLReadTimeout(time.Minute),
	}
	for _, off := range []string{"disable-quic", "disable-background-networking", "disable-component-update", "disable-sync"} {
		opts = append(opts, chromedp.Flag(off, true))
	}
	ctx, cancel := chromedp.NewContext(context.Background(), chromedp.WithAllocatorOptions(opts...))
	t.Cleanup(cancel)
	if err := chromedp.Do(ctx); err != nil {
		t.Fatal(err)
	}
	ctx, cancel = context.WithTimeout(ctx, 5*time.Minute)
	t.Cleanup(cancel)
	return ctx
}

// open shows a page in a window of a width and fails the test on anything that
// the page says on the console or asks for beyond itself.
func open(t *testing.T, ctx context.Context, page []byte, width int64) {
	t.Helper()
	file := filepath.Join(t.TempDir(), "page.html")
	if err := os.WriteFile(file, page, 0o666); err != nil {
		t.Fatal(err)
	}
	err := chromedp.Listen(ctx, func(ev any) {
		switch ev := ev.(type) {
		case *cdpruntime.EventConsoleAPICalled:
			t.Errorf("the page writes to the console: %s", ev.Type)
		case *cdpruntime.EventExceptionThrown:
			t.Errorf("the page throws: %s", ev.ExceptionDetails.Text)
		case *network.EventRequestWillBeSent:
			if u := ev.Request.URL; !strings.HasPrefix(u, "file://") && !strings.HasPrefix(u, "data:") {
				t.Errorf("the page asks for %s", u)
			}
		}
	})
	if err == nil {
		err = chromedp.Do(ctx, chromedp.EmulateViewport(width, 900), media("screen"), chromedp.Navigate("file://"+file))
	}
	if err != nil {
		t.Fatal(err)
	}
}

// paperWidth is the width of A4 within the margins, in pixels of a style sheet.
const paperWidth = 703

// printed shows the page as it is set for paper.
func printed(t *testing.T, ctx context.Context) {
	t.Helper()
	if err := chromedp.Do(ctx, chromedp.EmulateViewport(paperWidth, 1000), media("print")); err != nil {
		t.Fatal(err)
	}
}

// media sets what the page is shown for, "screen" or "print", and lets it have
// the focus.
func media(name string) chromedp.Action[chromedp.Void] {
	return chromedp.Func(func(ctx context.Context, target *chromedp.Target) error {
		if _, err := cdp.Call(ctx, target, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{Media: name}); err != nil {
			return err
		}
		_, err := cdp.Call(ctx, target, emulation.SetFocusEmulationEnabled, emulation.SetFocusEmulationEnabledParams{Enabled: true})
		return err
	})
}

// evaluate runs a script in the page and returns the lines that it finds.
func evaluate(t *testing.T, ctx context.Context, script string) []string {
	t.Helper()
	lines, err := chromedp.Run(ctx, chromedp.Evaluate[[]string]("(()=>{const out=[];"+script+";return out.slice(0,20)})()"))
	if err != nil {
		t.Fatal(err)
	}
	return lines
}
