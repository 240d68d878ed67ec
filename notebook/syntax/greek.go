package syntax

// greekLetters are the Greek letters by their English names, in the form that
// a page prints. Variants are other code points of the same letter.
var greekLetters = [...]struct {
	english  string
	letter   rune
	variants string
}{
	{"alpha", 'α', ""}, {"beta", 'β', "ϐ"}, {"gamma", 'γ', ""}, {"delta", 'δ', ""},
	{"epsilon", 'ε', "ϵ"}, {"zeta", 'ζ', ""}, {"eta", 'η', ""}, {"theta", 'θ', "ϑ"},
	{"iota", 'ι', ""}, {"kappa", 'κ', "ϰ"}, {"lambda", 'λ', ""}, {"mu", 'μ', "\u00b5"},
	{"nu", 'ν', ""}, {"xi", 'ξ', ""}, {"omicron", 'ο', ""}, {"pi", 'π', "ϖ"},
	{"rho", 'ρ', "ϱ"}, {"sigma", 'σ', "ς"}, {"tau", 'τ', ""}, {"upsilon", 'υ', ""},
	{"phi", 'φ', "ϕ"}, {"chi", 'χ', ""}, {"psi", 'ψ', ""}, {"omega", 'ω', ""},
	{"Alpha", 'Α', ""}, {"Beta", 'Β', ""}, {"Gamma", 'Γ', ""}, {"Delta", 'Δ', "\u2206"},
	{"Epsilon", 'Ε', ""}, {"Zeta", 'Ζ', ""}, {"Eta", 'Η', ""}, {"Theta", 'Θ', "ϴ"},
	{"Iota", 'Ι', ""}, {"Kappa", 'Κ', ""}, {"Lambda", 'Λ', ""}, {"Mu", 'Μ', ""},
	{"Nu", 'Ν', ""}, {"Xi", 'Ξ', ""}, {"Omicron", 'Ο', ""}, {"Pi", 'Π', ""},
	{"Rho", 'Ρ', ""}, {"Sigma", 'Σ', ""}, {"Tau", 'Τ', ""}, {"Upsilon", 'Υ', "ϒ"},
	{"Phi", 'Φ', ""}, {"Chi", 'Χ', ""}, {"Psi", 'Ψ', ""}, {"Omega", 'Ω', "\u2126"},
}

var (
	greekByRune = indexGreekRunes()
	greekByName = indexGreekNames()
)

func indexGreekRunes() map[rune]string {
	index := map[rune]string{}
	for _, g := range greekLetters {
		index[g.letter] = g.english
		for _, v := range g.variants {
			index[v] = g.english
		}
	}
	return index
}

func indexGreekNames() map[string]rune {
	index := map[string]rune{}
	for _, g := range greekLetters {
		index[g.english] = g.letter
	}
	return index
}
