package unit

import (
	"fmt"
	"math"
	"sort"
	"strings"

	"workheat/network/diag"
)

// named returns what a name stands for.
func (p *parser) named(name string, start int) value {
	v := value{start: start, end: p.pos}
	if name == "pi" {
		v.si = math.Pi
		return v
	}
	if u, power := lookUp(name); u != nil {
		v.si, v.dim, v.bare = u.factor, u.dim, true
		if u.level {
			v.level = u
		}
		if u.dim == pureTemperature && !u.level {
			v.temp = Either
		}
		if power > 1 {
			v = p.raise(v, float64(power))
			v.raised = true
		}
		return v
	}
	if q, ok := p.params[name]; ok {
		q = q.normal()
		v.si, v.dim, v.temp = q.Value, q.Dim, q.Temp
		return p.checked(v)
	}
	p.unknown(name, start)
	return value{}
}

// unknown reports a name that stands for nothing, with the cure that is most
// likely right.
func (p *parser) unknown(name string, start int) {
	what := "unit or parameter"
	if p.params == nil {
		what = "unit"
	}
	p.fail(start, p.pos, fmt.Sprintf("unknown %s %q", what, short(name)), p.cureName(name))
}

func (p *parser) cureName(name string) string {
	if help := hints[name]; help != "" {
		return help
	}
	if i := len(strings.TrimRight(name, "0123456789")); i < len(name) && byName[name[:i]] != nil {
		return "write " + name[:i] + "^" + name[i:]
	}
	if left, right := split(name); left != "" {
		return "write " + left + " " + right
	}
	known := unitNames
	if len(p.params) > 0 {
		known = append([]string(nil), unitNames...)
		for param := range p.params {
			known = append(known, param)
		}
		sort.Strings(known[len(unitNames):])
	}
	if near := diag.Nearest(name, known); near != "" {
		return "did you mean " + near + "?"
	}
	return ""
}

// split takes a name apart that is two units written without a blank.
func split(name string) (left, right string) {
	for i := 1; i < len(name) && i < 8; i++ {
		if byName[name[:i]] == nil {
			continue
		}
		if u, _ := lookUp(name[i:]); u != nil {
			return name[:i], name[i:]
		}
	}
	return "", ""
}
