package pdf

import (
	"bytes"
	"context"
	"fmt"
	goimage "image"
	_ "image/png" // what a browser's picture of itself is
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/chromedp"

	"gusset/notebook"
	"gusset/render"
	"gusset/render/figure"
	"gusset/render/fonts"
)

// figures are the drawings that the package figure is tested with.
func figures(t *testing.T) (names []string, list []*figure.Drawing) {
	t.Helper()
	files, err := filepath.Glob("../figure/testdata/*.md")
	if err != nil || len(files) == 0 {
		t.Fatal("no calc files", err)
	}
	for _, file := range files {
		sheet, err := notebook.Open(file)
		if err != nil || sheet.Failed() {
			t.Fatal(file, err)
		}
		for _, entries := range render.NewPage(sheet).Blocks {
			for _, e := range entries {
				if e.Drawing != nil {
					names = append(names, strings.TrimSuffix(filepath.Base(file), ".md")+"-"+e.Drawing.Number)
					list = append(list, e.Drawing.Art)
				}
			}
		}
	}
	return names, list
}

// program finds a program. Where there is none the test is skipped, and fails on
// the build server.
func program(t *testing.T, names ...string) string {
	t.Helper()
	for _, name := range names {
		if path, err := exec.LookPath(name); err == nil {
			return path
		}
	}
	if os.Getenv("CI") == "true" {
		t.Fatalf("no %s", names[0])
	}
	t.Skipf("no %s", names[0])
	return ""
}

// Drawings lie inset, in points, on pages of which a part is compared, in pixels.
const (
	inset       = 36
	resolution  = 144
	pixelsWide  = 840
	pixelsHigh  = 900
	pixelsOfCSS = resolution / 96.0
)

// A drawing has the same ink in a PDF as in a web page.
func TestFiguresOnPaperAndScreen(t *testing.T) {
	raster, chromium := program(t, "pdftoppm"), program(t, "chromium", "chromium-browser", "google-chrome")
	names, list := figures(t)
	paper := onPaper(t, raster, list)
	screen := onScreen(t, chromium, list)
	for i, name := range names {
		sum, other := paper[i].sum(), screen[i].sum()
		if sum < 200 || other < 200 || sum/other > 1.15 || other/sum > 1.15 {
			t.Errorf("%s: %.0f of ink on paper, %.0f on the screen", name, sum, other)
		}
		if lost := missing(paper[i], screen[i]); lost > 0.003 {
			t.Errorf("%s: %.2f %% of the ink on paper is not on the screen", name, 100*lost)
		}
		if lost := missing(screen[i], paper[i]); lost > 0.003 {
			t.Errorf("%s: %.2f %% of the ink on the screen is not on paper", name, 100*lost)
		}
	}
}

// darkness is that of each pixel, row by row, from 0 for white to 255.
type darkness []byte

func (d darkness) sum() float64 {
	sum := 0.0
	for _, v := range d {
		sum += float64(v) / 255
	}
	return sum
}

// missing is the share of the dark pixels of one picture that have nothing
// dark near them in another.
func missing(of, in darkness) float64 {
	const dark, trace, near = 90, 30, 2
	count, lost := 0, 0
	for y := range pixelsHigh {
		for x := range pixelsWide {
			if of[y*pixelsWide+x] < dark {
				continue
			}
			count++
			found := false
			for v := max(y-near, 0); v <= min(y+near, pixelsHigh-1) && !found; v++ {
				for u := max(x-near, 0); u <= min(x+near, pixelsWide-1); u++ {
					found = found || in[v*pixelsWide+u] > trace
				}
			}
			if !found {
				lost++
			}
		}
	}
	return float64(lost) / float64(max(count, 1))
}

func onPaper(t *testing.T, raster string, list []*figure.Drawing) (out []darkness) {
	t.Helper()
	c := newCanvas(paperOf("A4"))
	for _, d := range list {
		c.pdf.AddPage()
		c.drawing(&drawing{scale: 1, art: d}, inset, inset)
	}
	var file bytes.Buffer
	if err := c.pdf.Output(&file); err != nil {
		t.Fatal(err)
	}
	dir := t.TempDir()
	name := filepath.Join(dir, "figures.pdf")
	if err := os.WriteFile(name, file.Bytes(), 0o666); err != nil {
		t.Fatal(err)
	}
	if msg, err := exec.Command(raster, "-r", fmt.Sprint(resolution), "-png", "-gray", name, filepath.Join(dir, "page")).CombinedOutput(); err != nil || len(msg) > 0 {
		t.Fatalf("%s: %s %v", raster, msg, err)
	}
	pages, _ := filepath.Glob(filepath.Join(dir, "page*.png"))
	if len(pages) != len(list) {
		t.Fatalf("%d pages of %d drawings", len(pages), len(list))
	}
	for _, page := range pages {
		b, err := os.ReadFile(page)
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, darknessOf(t, decode(t, b), 0, 0))
	}
	return out
}

func decode(t *testing.T, b []byte) goimage.Image {
	t.Helper()
	m, _, err := goimage.Decode(bytes.NewReader(b))
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// darknessOf is a part of a picture.
func darknessOf(t *testing.T, m goimage.Image, left, top int) darkness {
	t.Helper()
	if m.Bounds().Dx() < left+pixelsWide || m.Bounds().Dy() < top+pixelsHigh {
		t.Fatalf("the picture is %v", m.Bounds())
	}
	out := make(darkness, pixelsWide*pixelsHigh)
	for y := range pixelsHigh {
		for x := range pixelsWide {
			r, g, b, _ := m.At(left+x, top+y).RGBA()
			out[y*pixelsWide+x] = byte(255 - (299*r+587*g+114*b)/1000>>8)
		}
	}
	return out
}

func onScreen(t *testing.T, chromium string, list []*figure.Drawing) (out []darkness) {
	t.Helper()
	// All in one picture, in rows of so many.
	const across = 6
	down := (len(list) + across - 1) / across
	var body bytes.Buffer
	for i, d := range list {
		body.WriteString("<figure>")
		body.Write(d.SVG(nil, fmt.Sprint("d", i)))
		body.WriteString("</figure>")
	}
	var runes fonts.Runes
	runes.Add(body.Bytes())
	css := []byte(strings.Join(fonts.Rules(&runes, fonts.Faces()...), ""))
	css = fmt.Appendf(css, "body{margin:0;display:grid;grid-template-columns:repeat(%d,max-content)}figure{margin:0;box-sizing:border-box;padding:%dpt;width:%gpx;height:%gpx}svg{display:block}", across, inset, pixelsWide/pixelsOfCSS, pixelsHigh/pixelsOfCSS)
	file := filepath.Join(t.TempDir(), "figures.html")
	page := "<!DOCTYPE html><meta charset=utf-8><style>" + string(css) + "</style>" + body.String()
	if err := os.WriteFile(file, []byte(page), 0o666); err != nil {
		t.Fatal(err)
	}
	ctx, cancel := chromedp.NewContext(context.Background(), chromedp.WithAllocatorOptions(
		chromedp.ExecPath(chromium), chromedp.NoSandbox, chromedp.DisableGPU, chromedp.NoFirstRun, chromedp.UserDataDir(t.TempDir()), chromedp.WSURLReadTimeout(time.Minute)))
	defer cancel()
	if err := chromedp.Do(ctx); err != nil {
		t.Fatal(err)
	}
	ctx, stop := context.WithTimeout(ctx, 5*time.Minute)
	defer stop()
	if err := chromedp.Do(ctx, chromedp.EmulateViewport(across*pixelsWide/pixelsOfCSS, int64(float64(down)*pixelsHigh/pixelsOfCSS), chromedp.EmulateScale(pixelsOfCSS)), chromedp.Navigate("file://"+file)); err != nil {
		t.Fatal(err)
	}
	b, err := chromedp.Run(ctx, chromedp.CaptureScreenshot())
	if err != nil {
		t.Fatal(err)
	}
	m := decode(t, b)
	for i := range list {
		out = append(out, darknessOf(t, m, i%across*pixelsWide, i/across*pixelsHigh))
	}
	return out
}
