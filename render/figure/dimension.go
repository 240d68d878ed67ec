package figure

import "math"

// dimension draws a dimension line between two points, moved out by a distance
// to the left of the way from the first to the second, with lines out to it
// and its value beside. A stretch that is too short for its arrows has them
// outside.
func (d *pad) dimension(a, b Point, out float64, value label) {
	length := math.Hypot(b.X-a.X, b.Y-a.Y)
	if length == 0 {
		// Too small for the scale of the drawing, but no less true.
		d.near(value, a, math.Abs(out), everywhere, math.Pi/2)
		return
	}
	ux, uy := (b.X-a.X)/length, (b.Y-a.Y)/length
	nx, ny := uy, -ux // to the left of the way, y being down
	const gap, over, head, tail = 2.5, 2.5, 5.0, 11.0
	from, to := a.plus(out*nx, out*ny), b.plus(out*nx, out*ny)
	extension := stroke{soft, 0.4, nil}
	d.line(extension, a.plus(gap*nx, gap*ny), from.plus(over*nx, over*ny))
	d.line(extension, b.plus(gap*nx, gap*ny), to.plus(over*nx, over*ny))
	if length > 2.6*head {
		d.line(fine, from, to)
		d.head(soft, from, -ux, -uy, head)
		d.head(soft, to, ux, uy, head)
	} else {
		d.line(fine, from.plus(-tail*ux, -tail*uy), to.plus(tail*ux, tail*uy))
		d.head(soft, from, ux, uy, head)
		d.head(soft, to, -ux, -uy, head)
	}
	outward := math.Atan2(-ny, nx)
	d.near(value, Point{(from.X + to.X) / 2, (from.Y + to.Y) / 2}, 4.8, everywhere, outward, outward+math.Pi)
}
