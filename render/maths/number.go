package maths

import (
	"strings"

	"gusset/units"
)

// figures takes the text of a number apart: its sign, its figures and its
// power of ten, which is empty for none.
func figures(value string) (negative bool, mantissa, power string) {
	mantissa = value
	if strings.HasPrefix(mantissa, "-") {
		negative, mantissa = true, mantissa[1:]
	}
	mantissa, power = units.SplitExponent(mantissa)
	return negative, mantissa, power
}

// bare reports whether the figures are digits and a point alone, so that a
// power or a fraction line can stand beside them without brackets.
func bare(value string) bool {
	for _, r := range value {
		if (r < '0' || r > '9') && r != '.' {
			return false
		}
	}
	return true
}

// Gap is the space between a number's figures and its unit. The signs of
// degrees, minutes and seconds stand right behind figures, but not behind a
// power of ten, where they would be read as part of the exponent; a unit that
// starts with a figure, as 1/m does, stands further off from figures, or
// 77.42 1/m would be read as 77.421/m.
func (n Number) Gap() Space {
	if len(n.Unit) == 0 {
		return 0
	}
	if _, power := units.SplitExponent(n.Value); power != "" {
		return Thin
	}
	switch n.Unit[0].Name {
	case "°", "′", "″":
		return 0
	case "1":
		return Wide
	}
	return Thin
}

// perUnit reports whether a unit has a division that a slash behind it would be
// read together with: the half of 0.3 N/mm is (0.3 N/mm)/2.
func (u Unit) perUnit() bool {
	for _, t := range u {
		if t.Sep == "/" {
			return true
		}
	}
	return false
}

// flat reports whether all exponents of a unit are figures that a face has as
// superscript characters, so that the unit is one run of text.
func (u Unit) flat() bool {
	for _, t := range u {
		if t.Den > 1 || t.Num < 1 || t.Num > 9 {
			return false
		}
	}
	return true
}

const superscripts = "⁰¹²³⁴⁵⁶⁷⁸⁹"

// superscript returns the superscript character of a figure.
func superscript(figure byte) string {
	switch i := figure - '0'; i {
	case 0:
		return superscripts[:3]
	case 1, 2, 3: // these are two bytes long
		return superscripts[1+2*int(i) : 3+2*int(i)]
	default:
		return superscripts[9+3*(int(i)-4) : 12+3*(int(i)-4)]
	}
}

// appendFlat appends a unit for which flat holds, or the part of any term that
// stands before its exponent.
func appendFlat(dst []byte, u Unit) []byte {
	for _, t := range u {
		dst = appendTerm(dst, t)
		if t.Num > 1 {
			dst = append(dst, superscript('0'+byte(t.Num))...)
		}
		if t.Close {
			dst = append(dst, ')')
		}
	}
	return dst
}

// appendTerm appends what stands before a term's exponent.
func appendTerm(dst []byte, t units.Term) []byte {
	dst = append(dst, t.Sep...)
	if t.Open {
		dst = append(dst, '(')
	}
	return append(dst, t.Name...)
}

// exponent is the exponent of a term as figures: "", "2", "−1", "1/2".
func exponent(t units.Term) string {
	if t.Num == 1 && t.Den <= 1 {
		return ""
	}
	s := digits(t.Num)
	if t.Den > 1 {
		s += "/" + digits(t.Den)
	}
	return s
}

// digits is a whole number with a true minus.
func digits(n int) string {
	if n < 0 {
		return "−" + digits(-n)
	}
	if n < 10 {
		return string(rune('0' + n))
	}
	return digits(n/10) + string(rune('0'+n%10))
}

// split parts the figures at the end of a name from its letters.
func split(head string) (letters, figures string) {
	i := len(head)
	for i > 0 && head[i-1] >= '0' && head[i-1] <= '9' {
		i--
	}
	if i == 0 {
		return head, ""
	}
	return head[:i], head[i:]
}

// primes is the mark of so many primes.
func primes(n int) string {
	return strings.Repeat("″", n/2) + strings.Repeat("′", n%2)
}
