package tree

import (
	"maps"
	"strings"
)

// listed finds the segments that the outline shows: none below a folded one, or,
// with a filter, those whose name, id or bed has its letters.
func (m Model) listed() Model {
	m.rows = nil
	if m.tree == nil {
		return m
	}
	wanted := strings.ToLower(strings.TrimSpace(m.filter.Value()))
	hidden := make([]bool, len(m.tree.Segments))
	for i, s := range m.tree.Segments {
		if s.Parent >= 0 {
			hidden[i] = hidden[s.Parent] || m.folded[m.tree.Segments[s.Parent].ID]
		}
		text := strings.ToLower(s.Name + "\n" + s.Bed + "\n" + s.ID)
		if wanted == "" && !hidden[i] || wanted != "" && strings.Contains(text, wanted) {
			m.rows = append(m.rows, i)
		}
	}
	return m
}

// filtered tells that the outline is a list of what a filter has left.
func (m Model) filtered() bool { return strings.TrimSpace(m.filter.Value()) != "" }

// set folds or unfolds segments, on a copy: a screen is a value.
func (m Model) set(folded bool, ids ...string) Model {
	m.folded = maps.Clone(m.folded)
	for _, id := range ids {
		if folded {
			m.folded[id] = true
		} else {
			delete(m.folded, id)
		}
	}
	return m.listed().placed()
}

// fold hides what hangs on the segment; on one with nothing to hide the cursor
// goes to its parent.
func (m Model) fold() Model {
	i := m.segment()
	if i < 0 {
		return m
	}
	s := m.tree.Segments[i]
	if !s.Terminal && !m.folded[s.ID] {
		return m.set(true, s.ID)
	}
	if s.Parent >= 0 {
		m.chosen = m.tree.Segments[s.Parent].ID
	}
	return m.placed()
}

// unfold shows what hangs on the segment.
func (m Model) unfold() Model {
	if i := m.segment(); i >= 0 {
		return m.set(false, m.tree.Segments[i].ID)
	}
	return m
}

// foldAll folds every segment but the trunk that the whole hangs on, or, where
// anything is folded, unfolds all.
func (m Model) foldAll() Model {
	var ids []string
	for _, s := range m.tree.Segments {
		if !s.Terminal && s.Depth > 0 {
			ids = append(ids, s.ID)
		}
	}
	if len(m.folded) > 0 {
		m.folded = map[string]bool{}
		return m.listed().placed()
	}
	if i := m.segment(); i >= 0 { // the cursor stays on what remains to be seen
		for s := m.tree.Segments[i]; s.Parent >= 0; s = m.tree.Segments[s.Parent] {
			if s.Depth == 1 {
				m.chosen = s.ID
			}
		}
	}
	return m.set(true, ids...)
}
