package units

// DecimalToSI converts mant × 10^exp in the unit to coherent SI, rounded once,
// where that takes no more than one division of whole floats; ok is false
// where it does, and LiteralToSI serves.
func (u Unit) DecimalToSI(mant int64, exp int) (si float64, ok bool) {
	p := u.get()
	f := p.factor
	if p.zero != nil || f.rat != nil || f.pi != 0 || exp < -15 || exp > 15 || mant < 0 {
		return 0, false
	}
	num, den := f.num, f.den
	for ; exp > 0 && num < exactLimit/10; exp-- {
		num *= 10
	}
	for ; exp < 0 && den < exactLimit/10; exp++ {
		den *= 10
	}
	if exp != 0 || num > exactLimit || den > exactLimit || mant != 0 && num > exactLimit/uint64(mant) {
		return 0, false
	}
	return float64(uint64(mant)*num) / float64(den), true
}
