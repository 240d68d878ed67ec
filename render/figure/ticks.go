package figure

import (
	"math"
	"strconv"

	"gusset/units"
)

// scale is the range of an axis and its ticks. Values are held in units of
// 10^power, so that the figures along the axis stay short and no difference
// overflows.
type scale struct {
	low, high float64
	power     int // a multiple of 3
	ticks     []float64
	decimals  int
}

// Values below vanishing are drawn as 0, and a spread below alike of the
// values as none: they are the dust of rounding.
const (
	vanishing = 1e-290
	alike     = 1e-9
)

// newScale takes a range in an axis' unit. tight ends the axis at the range
// itself, as for a swept value; else it ends at ticks, and at 0 where that is not
// far. At most so many steps lie between ticks.
func newScale(over [2]float64, tight bool, most int) scale {
	low, high := over[0], over[1]
	largest := math.Max(math.Abs(low), math.Abs(high))
	if !(largest > vanishing) || math.IsInf(largest, 0) {
		return scale{low: 0, high: 1, ticks: []float64{0, 1}}
	}
	s := scale{power: powerOf(largest)}
	low, high = shifted(low, -s.power), shifted(high, -s.power)
	largest = shifted(largest, -s.power)
	if high-low < alike*largest {
		low, high = low-0.1*largest, high+0.1*largest
	}
	if !tight {
		low, high = withZero(low, high)
	}
	s.low, s.high = low, high
	exponent, mantissa := stepOf((high - low) / float64(most))
	step := shifted(mantissa, exponent)
	first, last := math.Floor(low/step+alike), math.Ceil(high/step-alike)
	if tight {
		first, last = math.Ceil(low/step-alike), math.Floor(high/step+alike)
	} else {
		s.low, s.high = shifted(first*mantissa, exponent), shifted(last*mantissa, exponent)
	}
	for n := first; n <= last; n++ {
		s.ticks = append(s.ticks, shifted(n*mantissa, exponent))
	}
	s.decimals = max(0, -exponent)
	if len(s.ticks) < 2 {
		return newScale(over, tight, 2*most)
	}
	return s
}

// scaleIn is a scale for values in a unit. A quarter turn or more in degrees
// is parted as a circle is.
func scaleIn(u units.Unit, over [2]float64, tight bool, most int) scale {
	low, high := over[0], over[1]
	if u.String() != "deg" || !(high-low >= 90) {
		return newScale(over, tight, most)
	}
	if !tight {
		low, high = withZero(low, high)
	}
	for _, step := range []float64{15, 30, 45, 90, 180, 360} {
		if (high-low)/step > float64(most)*(1+alike) {
			continue
		}
		s := scale{low: low, high: high}
		first, last := math.Floor(low/step+alike), math.Ceil(high/step-alike)
		if tight {
			first, last = math.Ceil(low/step-alike), math.Floor(high/step+alike)
		} else {
			s.low, s.high = first*step, last*step
		}
		for n := first; n <= last; n++ {
			s.ticks = append(s.ticks, n*step)
		}
		if len(s.ticks) < 2 {
			break
		}
		return s
	}
	return newScale(over, tight, most)
}

// withZero moves the end of a range to 0 where the range would otherwise begin
// above less than 60 % of its values.
func withZero(low, high float64) (float64, float64) {
	switch {
	case low > 0 && low < 0.6*high:
		low = 0
	case high < 0 && high > 0.6*low:
		high = 0
	}
	return low, high
}

// powerOf is the power of ten that is taken out of the figures of an axis, 0
// for values from 0.001 to below 100,000.
func powerOf(largest float64) int {
	if largest >= 1e-3 && largest < 1e5 {
		return 0
	}
	return 3 * int(math.Floor(math.Log10(largest)/3+alike))
}

// shifted is x·10^n, in two strides where 10^n alone is out of range.
func shifted(x float64, n int) float64 {
	const stride = 300
	switch {
	case n > stride:
		return x * math.Pow10(stride) * math.Pow10(n-stride)
	case n < -stride:
		return x / math.Pow10(stride) / math.Pow10(-n-stride)
	case n < 0:
		return x / math.Pow10(-n)
	}
	return x * math.Pow10(n)
}

// stepOf is the smallest of 1, 2, 5 times a power of ten that is not below x.
func stepOf(x float64) (exponent int, mantissa float64) {
	exponent = int(math.Floor(math.Log10(x)))
	switch m := x / math.Pow10(exponent); {
	case m <= 1+alike:
		return exponent, 1
	case m <= 2+alike:
		return exponent, 2
	case m <= 5+alike:
		return exponent, 5
	}
	return exponent + 1, 1
}

// at is where a value in the axis' unit lies along it, 0 at its low end and 1
// at its high end.
func (s *scale) at(x float64) float64 { return s.along(shifted(x, -s.power)) }

// along is the same for a value in the scale's own figures.
func (s *scale) along(x float64) float64 { return (x - s.low) / (s.high - s.low) }

// figures prints a tick.
func (s *scale) figures(tick float64) string {
	text := strconv.FormatFloat(tick, 'f', s.decimals, 64)
	if tick == 0 {
		return "0"
	}
	return text
}
