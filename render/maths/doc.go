// Package maths holds the display tree of a formula and its writers: MathML
// Core for browsers, boxes for paper, and plain Unicode text for the terminal.
//
// The tree says how a formula looks, not what it means: brackets stand where
// the builder put them, and no writer computes anything. A tree is built once,
// from values, and never changed, so one tree may serve all writers at once.
//
// The formula τ = P/(2 A) = 48 kN/(2·490.9 mm²) is the chain
//
//	tau := maths.Symbol{Head: "τ", Ref: maths.Ref{Target: "tau"}}
//	P := maths.Symbol{Head: "P"}
//	A := maths.Symbol{Head: "A"}
//	kN := maths.Unit{{Name: "kN", Num: 1, Den: 1}}
//	mm2 := maths.Unit{{Name: "mm", Num: 2, Den: 1}}
//	c := maths.Chain{
//		Left: tau,
//		Steps: []maths.Step{
//			{Sign: "=", Right: maths.Fraction{
//				Num: P,
//				Den: maths.Row{maths.Number{Value: "2"}, maths.Beside, A},
//			}},
//			{Sign: "=", Right: maths.Fraction{
//				Num: maths.Number{Value: "48", Unit: kN, Ref: maths.Ref{Target: "P", Tip: "P = 48 kN"}},
//				Den: maths.Row{maths.Number{Value: "2"}, maths.Dot, maths.Number{Value: "490.9", Unit: mm2}},
//			}},
//		},
//	}
//	html = maths.AppendChain(html, c, 29) // in a column of 29 ems
//	text = maths.AppendPlainChain(text, c)
//	lines := maths.Break(c, 11, 340) // at 11 pt, in a column of 340 pt
//
// # Spacing
//
// Neighbours in a row are spaced by the classes of TeX (ordinary, function,
// binary operator, relation, opening, closing, punctuation, inner): a thin
// space of 3/18 em after punctuation and round functions and fractions, 4/18 em
// round binary operators, 5/18 em round relations; the latter two vanish in
// scripts. A binary operator with nothing to its left to act on is a sign and
// stands close. Beside, the unwritten multiplication, is a thin space, and so
// is the space between a number and its unit. In a browser the same widths come
// from MathML's operator dictionary.
//
// # Letters
//
// By ISO 80000-2 a quantity is italic and a word, a numeral or a function's
// name upright, in subscripts too. A quantity named by several letters is set
// as one italic word, so that it is told from units and functions; figures
// at its end are upright.
//
// # Deviations from TeX
//
// Formulas were compared by eye with those of TeX (TestBesideTeX in render/pdf,
// run by hand). Spaces, bars on the axis, roots and growing brackets agree. Kept
// different are: no blank of its own beside a fraction, so that a sign stands
// closer to its bar than TeX's 1.2 pt; exponents behind a bracket, which follow
// the bracket's height where TeX gives small brackets a letter's; a fraction
// inside a fraction, which is written with a slash where TeX sets it in script
// size, too small to check; a dot before a bracket that holds a fraction,
// so that a product is not taken for a function.
//
// # Deviations in a browser
//
// Chromium reserves the room of the widest root sign for each root, so a gap
// stays behind narrow ones. It sets no thin space beside a fraction, and cannot
// break a line inside of brackets: a formula that is too long even so scrolls.
// Its selection puts every token on a line of its own when it is copied.
package maths
