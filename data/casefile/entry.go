package casefile

import (
	"bytes"
	"slices"

	"github.com/pelletier/go-toml/v2/unstable"
)

// entry is a place in the file that sets a key, or an entry of a table.
type entry struct {
	key     string
	name    string // of the entry of a table
	inTable bool
	line    int // counted from 1
}

// path is how [Case.Line] calls the place.
func (e entry) path() string {
	if e.inTable {
		return e.key + "." + e.name
	}
	return e.key
}

// entries lists the places of well-formed TOML in their order, each once. What
// is deeper than an entry of a table counts as that entry.
func entries(content []byte) []entry {
	l := listing{seen: make(map[string]bool), content: content, line: 1}
	l.parser.Reset(content)
	for l.parser.NextExpression() {
		switch e := l.parser.Expression(); e.Kind {
		case unstable.Table, unstable.ArrayTable:
			l.table = l.add(nil, e)
		case unstable.KeyValue:
			l.keyValue(l.table, e)
		}
	}
	return l.list
}

// listing is the state of [entries].
type listing struct {
	parser  unstable.Parser
	content []byte
	table   []string // what the last header names
	list    []entry
	seen    map[string]bool
	offset  int // up to which lines are counted
	line    int
}

// keyValue adds what a key with its value says within the table above it.
func (l *listing) keyValue(above []string, n *unstable.Node) {
	path := l.add(above, n)
	if n.Value().Kind != unstable.InlineTable {
		return
	}
	for inner := n.Value().Children(); inner.Next(); {
		l.keyValue(path, inner.Node())
	}
}

// add adds the place that the key of n names and returns its path, of which
// two parts matter.
func (l *listing) add(above []string, n *unstable.Node) []string {
	key := n.Key()
	key.Next()
	l.count(int(key.Node().Raw.Offset))
	path := slices.Clip(above)
	for ok := true; ok && len(path) < 2; ok = key.Next() {
		path = append(path, string(key.Node().Data))
	}
	e := entry{key: path[0], line: l.line}
	if len(path) > 1 {
		e.name, e.inTable = path[1], true
	}
	if id := e.path(); !l.seen[id] {
		l.seen[id] = true
		l.list = append(l.list, e)
	}
	return path
}

// count moves on to the line of offset; offsets never fall.
func (l *listing) count(offset int) {
	l.line += bytes.Count(l.content[l.offset:offset], []byte("\n"))
	l.offset = offset
}
