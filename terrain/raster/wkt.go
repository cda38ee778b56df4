package raster

import (
	"strconv"
	"strings"
)

// A wkt is a coordinate reference system in well-known text, as GDAL hands it over: a keyword
// with values and further nodes in brackets.
type wkt struct {
	text     string // the node as written
	keyword  string
	values   []string // without quotation marks
	children []wkt
}

// parseWKT reads well-known text. It takes anything: text that is none gives an empty keyword or
// ends early, and whoever asks it for a part gets none.
func parseWKT(text string) wkt {
	node, _ := parseNode(text)
	return node
}

// parseNode reads the node at the start of the text and returns what follows it.
func parseNode(text string) (node wkt, rest string) {
	open := strings.IndexByte(text, '[')
	if open < 0 {
		return wkt{}, ""
	}
	node.keyword = strings.TrimSpace(text[:open])
	rest = text[open+1:]
	for rest != "" && rest[0] != ']' {
		switch end := strings.IndexAny(rest, `,[]"`); {
		case end < 0:
			rest = ""
		case rest[end] == '[':
			var child wkt
			child, rest = parseNode(rest)
			node.children = append(node.children, child)
		case rest[end] == '"':
			var value string
			value, rest = parseString(rest[end:])
			node.values = append(node.values, value)
		default:
			if value := strings.TrimSpace(rest[:end]); value != "" {
				node.values = append(node.values, value)
			}
			rest = rest[end:]
		}
		rest = strings.TrimLeft(rest, ", \n")
	}
	rest = strings.TrimPrefix(rest, "]")
	node.text = text[:len(text)-len(rest)]
	return node, rest
}

// parseString reads a text in quotation marks; two of them stand for one inside.
func parseString(text string) (value, rest string) {
	for i := 1; i < len(text); i++ {
		if text[i] != '"' {
			continue
		}
		if i+1 < len(text) && text[i+1] == '"' {
			i++
			continue
		}
		return strings.ReplaceAll(text[1:i], `""`, `"`), text[i+1:]
	}
	return "", ""
}

// child returns the first child with one of the keywords, or nil.
func (w wkt) child(keywords ...string) *wkt {
	for i := range w.children {
		for _, keyword := range keywords {
			if w.children[i].keyword == keyword {
				return &w.children[i]
			}
		}
	}
	return nil
}

// name is the name of a system, "WGS 84 / UTM zone 27N".
func (w wkt) name() string {
	if len(w.values) == 0 {
		return ""
	}
	return w.values[0]
}

// epsg is the code of a system in the EPSG register, 0 if it names none.
func (w wkt) epsg() int {
	id := w.child("AUTHORITY", "ID")
	if id == nil || len(id.values) < 2 || id.values[0] != "EPSG" {
		return 0
	}
	code, _ := strconv.Atoi(id.values[1])
	return code
}

// split divides a compound system into its horizontal and vertical part; others have no second.
func (w wkt) split() (horizontal wkt, vertical *wkt) {
	if (w.keyword == "COMPD_CS" || w.keyword == "COMPOUNDCRS") && len(w.children) >= 2 {
		return w.children[0], &w.children[1]
	}
	return w, nil
}

// unitM is the size in metres of a vertical system's unit, 0 if it states none.
func (w wkt) unitM() float64 {
	from := w
	if axis := w.child("AXIS"); w.child("UNIT", "LENGTHUNIT") == nil && axis != nil {
		from = *axis
	}
	unit := from.child("UNIT", "LENGTHUNIT")
	if unit == nil || len(unit.values) < 2 {
		return 0
	}
	size, _ := strconv.ParseFloat(unit.values[1], 64)
	return size
}

// isGeographic says whether a horizontal system counts in degrees of longitude and latitude.
func (w wkt) isGeographic() bool {
	switch w.keyword {
	case "GEOGCS", "GEOGCRS", "GEODCRS", "GEOGRAPHICCRS":
		return true
	}
	return false
}

// hasHeight says whether a system has a third axis, ellipsoidal heights.
func (w wkt) hasHeight() bool {
	cs := w.child("CS")
	return cs != nil && len(cs.values) >= 2 && cs.values[1] == "3"
}
