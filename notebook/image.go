package notebook

import (
	"bytes"
	"encoding/binary"
	"fmt"
	"hash/crc32"
	"image"
	"image/gif"
	_ "image/jpeg" // with GIF, the formats that both pages can show
	_ "image/png"

	"gusset/notebook/diag"
)

// maxPixels bounds an image once it is unpacked: 200 MB of memory.
const maxPixels = 50_000_000

// Image is an image of the prose or a logo, whole and of a kind that both
// pages can show.
type Image struct {
	Path          string // within the root
	Format        string // "png", "jpeg" or "gif"
	Width, Height int    // in pixels
	Data          []byte
}

// image loads an image, once. name is what the author calls it.
func (d *Draft) image(file, name string) *fault {
	if d.images[file] != nil {
		return nil
	}
	d.watched(file)
	data, f := readBounded(d.ctx.FS, file)
	if f != nil {
		return f.of(name)
	}
	config, format, err := image.DecodeConfig(bytes.NewReader(data))
	if err != nil {
		return &fault{diag.MissingFile, fmt.Sprintf("`%s` is no image that can be shown", name), []string{"an image is PNG, JPEG or GIF, whatever its name says"}}
	}
	if config.Width <= 0 || config.Height <= 0 || config.Width > maxPixels/config.Height {
		return &fault{diag.BoundExceeded, fmt.Sprintf("`%s` has %d × %d pixels, and an image may have %d million at most",
			name, config.Width, config.Height, maxPixels/1_000_000), nil}
	}
	if !whole(format, data) {
		return &fault{diag.MissingFile, fmt.Sprintf("`%s` is an image that was cut off or damaged", name), nil}
	}
	d.images[file] = &Image{Path: file, Format: format, Width: config.Width, Height: config.Height, Data: data}
	return nil
}

// whole tells whether an image has its end, which a copy that was cut off
// lacks. Of a PNG it checks every part; a GIF, which has no checksums and is
// small, must unpack.
func whole(format string, data []byte) bool {
	switch format {
	case "png":
		return wholePNG(data)
	case "jpeg":
		return bytes.Contains(data[max(len(data)-64<<10, 0):], []byte{0xFF, 0xD9})
	}
	_, err := gif.Decode(bytes.NewReader(data))
	return err == nil && bytes.HasSuffix(bytes.TrimRight(data, "\x00"), []byte{';'})
}

func wholePNG(data []byte) bool {
	const signature, overhead = 8, 12
	for at := signature; at+overhead <= len(data); {
		size := int(binary.BigEndian.Uint32(data[at:]))
		if size < 0 || size > len(data)-at-overhead {
			return false
		}
		body := data[at+4 : at+8+size]
		if crc32.ChecksumIEEE(body) != binary.BigEndian.Uint32(data[at+8+size:]) {
			return false
		}
		if string(body[:4]) == "IEND" {
			return true
		}
		at += overhead + size
	}
	return false
}
