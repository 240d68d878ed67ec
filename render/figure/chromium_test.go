package figure_test

import (
	"bytes"
	"context"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/cdproto/network"
	cdpruntime "github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"

	"gusset/render/fonts"
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

// page is a web page of drawings with the faces that they need.
func page(list []drawn) []byte {
	var body bytes.Buffer
	for _, d := range list {
		body.WriteString(`<figure id="` + d.name + `">`)
		body.Write(d.SVG(nil, d.name))
		body.WriteString("</figure>\n")
	}
	var runes fonts.Runes
	runes.Add(body.Bytes())
	css := strings.Join(fonts.Rules(&runes, fonts.Faces()...), "")
	return []byte("<!DOCTYPE html><html lang=en><meta charset=utf-8><title>Drawings</title><style>" + css +
		"body{margin:0}figure{margin:0 0 20px}svg{display:block}</style>" + body.String() + "</html>")
}

// open shows a page and fails the test on anything that it says on the console
// or asks for beyond itself.
func open(t *testing.T, ctx context.Context, page []byte, options ...chromedp.EmulateViewportOption) {
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
		err = chromedp.Do(ctx, chromedp.EmulateViewport(800, 900, options...), chromedp.Navigate("file://"+file))
	}
	if err != nil {
		t.Fatal(err)
	}
}

// awaited has a script's promise kept before its value is taken.
func awaited(p *cdpruntime.EvaluateParams) { p.AwaitPromise = new(true) }

// A browser draws all drawings without complaint, finds their names, sets each
// text in the page's faces as wide as it was laid out for, and within the drawing.
func TestChromium(t *testing.T) {
	ctx := browser(t)
	list := drawings(t)
	open(t, ctx, page(list))
	// Widths are compared with the sums of the advances of the faces.
	var widths strings.Builder
	for _, d := range list {
		for _, it := range d.Items {
			for _, r := range it.Text {
				widths.WriteString(strconv.FormatFloat(r.Width, 'f', 3, 64) + ",")
			}
		}
	}
	got, err := chromedp.Run(ctx, chromedp.Evaluate[[]string](`document.fonts.ready.then(() => {
		const out = [], widths = [`+widths.String()+`];
		const runs = [...document.querySelectorAll("tspan")];
		if (runs.length != widths.length) out.push(runs.length + " runs, want " + widths.length);
		runs.forEach((r, i) => {
			const w = r.getComputedTextLength();
			if (Math.abs(w - widths[i]) > 0.02 * widths[i] + 0.15) out.push(r.closest("figure").id + ": " + r.textContent + " is " + w + " wide, want " + widths[i]);
			const face = getComputedStyle(r);
			if (!document.fonts.check(face.fontStyle + " " + face.fontWeight + " 10px " + face.fontFamily.split(",")[0], r.textContent)) out.push("no face for " + r.textContent);
		});
		for (const s of document.querySelectorAll("svg")) {
			const id = s.closest("figure").id, v = s.viewBox.baseVal;
			for (const t of s.querySelectorAll("text")) {
				const b = t.getBBox();
				if (b.x < -1 || b.y < -2.5 || b.x + b.width > v.width + 1 || b.y + b.height > v.height + 2.5) out.push(id + ": " + t.textContent + " leaves the drawing");
			}
			for (const p of s.querySelectorAll("path")) {
				const b = p.getBBox();
				if (!(b.x >= -0.5 && b.y >= -0.5 && b.x + b.width <= v.width + 0.5 && b.y + b.height <= v.height + 0.5)) out.push(id + ": a path leaves the drawing");
			}
			const r = s.getBoundingClientRect();
			if (Math.abs(r.width - v.width * 4 / 3) > 0.5) out.push(id + " is shown " + r.width + " wide");
			for (const ref of s.getAttribute("aria-labelledby").split(" ")) {
				if (!s.querySelector("#" + CSS.escape(ref))) out.push(id + ": nothing has the id " + ref);
			}
		}
		return out.slice(0, 20);
	})`, awaited))
	if err != nil {
		t.Fatal(err)
	}
	for _, line := range got {
		t.Error(line)
	}
}
