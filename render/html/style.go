package html

import _ "embed"

// sheetCSS is the look of the page; maths.CSS comes before it.
//
//go:embed sheet.css
var sheetCSS string
