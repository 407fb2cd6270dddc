package chart

import (
	"strings"

	"afterbeat/data"
)

// entry is one word of the legend and the sign that it explains.
type entry struct {
	name data.Text
	key  string // one cell
	ink  ink
}

// legend explains the named series and marks.
func (p Plot) legend(t Theme) []entry {
	var out []entry
	for k, s := range p.Series {
		if name := t.clean(s.Name); name.Width() > 0 {
			glyph := s.Glyph.of(k)
			out = append(out, entry{name, glyph.key(t), glyph.ink()})
		}
	}
	for _, m := range p.Marks {
		if name := t.clean(m.Name); name.Width() > 0 {
			out = append(out, entry{name, string(t.char(m.Char)), plain})
		}
	}
	return out
}

// header writes the unit of y over its labels, the title, and the legend
// "native ─  supported *". Where they do not fit, the title is cut first.
func (p Plot) header(b *strings.Builder, f frame, t Theme) {
	h := line{b: b, left: f.width}
	unit := t.clean(p.Y.Unit)
	h.space(f.label - unit.Width())
	h.text(unit)
	h.space(max(f.label+2-(f.width-h.left), 2))
	entries := p.legend(t)
	room := h.left
	for _, e := range entries {
		room -= e.name.Width() + 4 // a space, the key, two spaces
	}
	title := t.clean(p.Title).Cut(max(room, 0))
	h.text(title)
	for k, e := range entries {
		if k > 0 || title.Width() > 0 {
			h.space(2)
		}
		h.text(e.name)
		h.space(1)
		h.sign(t.change(plain, e.ink), e.key, t.change(e.ink, plain))
	}
}
