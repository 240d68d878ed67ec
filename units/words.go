package units

import "strings"

// Words describes a dimension for a message. It is the quantity's name, or words that build the
// dimension from known ones, such as "stress times length^(1/2)"; it is never empty.
//
// Words that are built start from one quantity that takes in most of the exponents, and name
// what is left base by base. Of all such descriptions the one of fewest words wins.
func (d Dimension) Words() string {
	if q, ok := quantitiesByDim[d]; ok {
		if q.words != "" {
			return q.words
		}
		return q.name
	}
	best, bestCost := "", 0
	for _, start := range wordStarts {
		factors, ok := d.startingFrom(start)
		if !ok {
			continue
		}
		cost := 2 * len(factors)
		for _, f := range factors {
			if f.pow != (exponent{num: 1}) && f.pow != (exponent{num: -1}) {
				cost += int(magnitude(int64(f.pow.num)) / uint64(f.pow.den())) // "stress times length^(1/2)" before "force per length^(3/2)"
			}
		}
		if best == "" || cost < bestCost {
			best, bestCost = joinWords(factors), cost
		}
	}
	return best
}

// wordStarts are the quantities that a description may start from; of equals the first wins.
var wordStarts = []string{
	"number", "force", "stress", "speed", "acceleration", "moment", "mass", "power", "density", "voltage",
}

type wordFactor struct {
	name string
	pow  exponent
}

// startingFrom writes d as a power of the named quantity and of what is left, base by base. The
// power is the one that takes in all of d's mass, or all of its length where neither has mass, or else 1.
func (d Dimension) startingFrom(name string) ([]wordFactor, bool) {
	var factors []wordFactor
	rest := d
	if start := quantitiesByName[name]; !start.IsNumber() {
		pow := exponent{num: 1}
		mass, length := d.exp[baseMass], d.exp[baseLength]
		switch startMass := start.exp[baseMass]; {
		case mass.num != 0 && startMass.num != 0:
			pow = mass
		case mass.num == 0 && startMass.num == 0 && length.num != 0:
			pow = length
		}
		power, err := start.Pow(int64(pow.num), pow.den())
		if err != nil {
			return nil, false
		}
		if rest, err = d.Div(power); err != nil {
			return nil, false
		}
		factors = append(factors, wordFactor{name, pow})
	}
	for i, e := range rest.exp {
		if e.num != 0 {
			factors = append(factors, baseWord(i, e))
		}
	}
	return factors, true
}

var baseWords = [7]string{"length", "mass", "time", "electric current", "temperature", "amount of substance", "luminous intensity"}

// baseWord names a power of a base: length^2 is an area, length^-3 is "per volume".
func baseWord(base int, e exponent) wordFactor {
	if base == baseLength && e.denLess1 == 0 {
		switch e.num {
		case 2, -2:
			return wordFactor{"area", exponent{num: e.num / 2}}
		case 3, -3:
			return wordFactor{"volume", exponent{num: e.num / 3}}
		}
	}
	return wordFactor{baseWords[base], e}
}

func joinWords(factors []wordFactor) string {
	var over, under []string
	for _, f := range factors {
		if f.pow.num > 0 {
			over = append(over, f.name+powerText(f.pow))
		} else {
			f.pow.num = -f.pow.num
			under = append(under, f.name+powerText(f.pow))
		}
	}
	text := strings.Join(over, " times ")
	if text == "" {
		text = "number"
	}
	if len(under) > 0 {
		text += " per " + strings.Join(under, " and ")
	}
	return text
}

// Article returns the words with their article: "a stress", "an area", "a plain number".
func (d Dimension) Article() string {
	if d.IsNumber() {
		return "a plain number"
	}
	words := d.Words()
	if strings.ContainsRune("aeiou", rune(words[0])) {
		return "an " + words
	}
	return "a " + words
}
