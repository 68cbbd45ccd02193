package export

import (
	"strconv"
	"strings"
)

// records collects handles, layers and line types, and counts.
func (c *dxfChecker) records() {
	counted, want, line := 0, -1, 0
	for _, r := range c.recs {
		first := r[0]
		kind := strings.TrimSpace(first.value)
		c.handle(kind, r)
		switch kind {
		case "TABLE":
			counted, line = -1, first.line // the TABLE itself does not count
			want, _ = strconv.Atoi(strings.TrimSpace(firstText(r, 70)))
		case "ENDTAB":
			if counted != want {
				c.report(line, "the table says %d records and has %d", want, counted)
			}
		case "LAYER", "LTYPE":
			name := kind + " " + strings.ToUpper(firstText(r, 2))
			if c.defined[name] {
				c.report(first.line, "%s for the second time", name)
			}
			c.defined[name] = true
		case "LWPOLYLINE":
			n := countCode(r, 10)
			if firstText(r, 90) != strconv.Itoa(n) {
				c.report(first.line, "group 90 says %s vertices, there are %d", firstText(r, 90), n)
			}
			if countCode(r, 42) != n || countCode(r, 20) != n {
				c.report(first.line, "%d vertices, %d y, %d bulges", n, countCode(r, 20), countCode(r, 42))
			}
			c.closed(r)
		case "POLYLINE":
			c.closed(r)
		case "VERTEX":
			if countCode(r, 42) != 1 {
				c.report(first.line, "VERTEX without one bulge")
			}
		}
		counted++
	}
}

// closed checks a polyline's flag.
func (c *dxfChecker) closed(r []dxfPair) {
	if firstText(r, 70) != "1" {
		c.report(r[0].line, "%s is not flagged closed: group 70 is %q", r[0].value, firstText(r, 70))
	}
}

// handle checks a record's own handle: there, hexadecimal, used once, below $HANDSEED.
func (c *dxfChecker) handle(kind string, r []dxfPair) {
	switch kind {
	case "SECTION", "ENDSEC", "ENDTAB", "EOF":
		return
	}
	code := 5
	if kind == "DIMSTYLE" {
		code = 105
	}
	h := firstText(r, code)
	if h == "" {
		if !c.r12 {
			c.report(r[0].line, "%s has no handle", kind)
		}
		return
	}
	n, err := strconv.ParseUint(h, 16, 64)
	if err != nil || n == 0 {
		c.report(r[0].line, "%.20q is not a handle", h)
		return
	}
	if at, ok := c.handles[h]; ok {
		c.report(r[0].line, "handle %s is used in line %d already", h, at)
	}
	c.handles[h] = r[0].line
	seed, err := strconv.ParseUint(firstText(c.vars["$HANDSEED"], 5), 16, 64)
	if err != nil || n >= seed {
		c.report(r[0].line, "handle %s is not below $HANDSEED %q", h, firstText(c.vars["$HANDSEED"], 5))
	}
}

// references checks that owners and other handles, layers and line types exist.
func (c *dxfChecker) references() {
	for _, r := range c.recs {
		owner := false
		for _, p := range r {
			switch {
			case p.code >= 320 && p.code < 370:
				owner = owner || p.code == 330
				if _, ok := c.handles[p.value]; !ok && p.value != "0" {
					c.report(p.line, "handle %.20q in group %d does not exist", p.value, p.code)
				}
			case p.code == 8 && !c.defined["LAYER "+strings.ToUpper(p.value)]:
				c.report(p.line, "layer %.40q is not defined", p.value)
			case p.code == 6 && !c.defined["LTYPE "+strings.ToUpper(p.value)]:
				c.report(p.line, "line type %.40q is not defined", p.value)
			}
		}
		switch r[0].value {
		case "SECTION", "ENDSEC", "ENDTAB", "EOF":
		default:
			if !c.r12 && !owner {
				c.report(r[0].line, "%s has no owner (group 330)", r[0].value)
			}
		}
	}
}

// firstText returns the first value under a code, or "".
func firstText(r []dxfPair, code int) string {
	for _, p := range r {
		if p.code == code {
			return strings.TrimSpace(p.value)
		}
	}
	return ""
}

// countCode returns how many groups of a record have this code.
func countCode(r []dxfPair, code int) int {
	n := 0
	for _, p := range r {
		if p.code == code {
			n++
		}
	}
	return n
}
