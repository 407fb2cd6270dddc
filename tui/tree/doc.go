// Package tree is the screen of the fourth stage: the patient's arteries, and
// the pulse of the measured flow in them.
//
// It begins with the outline: each segment before its daughters, with the bed it
// feeds, its mean flow, the pulse pressure and the index of flow at its end. Left
// and right fold and unfold, / filters by name and bed. Beside it, or below it on
// a small terminal, stand pressure and flow at the chosen segment over those of
// the root, flow over its mean, so that a small artery can be compared. All
// curves are prepared when the tree arrives, within bounds that all segments
// share: moving the cursor draws two pictures and computes nothing.
//
// Other views hold the beds in place of the segments; the impedance of the root,
// of the tree and as measured, with the reflection at the chosen segment; the
// traces that were measured over those of the tree; and how the tree was made.
package tree
