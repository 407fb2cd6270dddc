package tree

import "fmt"

// SegmentError is an error in one segment of a network.
type SegmentError struct {
	Index int    // in Network.Segments; -1 where the network as a whole is meant
	ID    string // of the segment
	What  string
	Hint  string // what to do; may be empty
}

// Error names the segment and what is wrong with it.
func (e *SegmentError) Error() string {
	if e.Index < 0 {
		return e.What
	}
	return fmt.Sprintf("segment %q: %s", e.ID, e.What)
}

// shape is how the segments of a network hang together.
type shape struct {
	order  []int32 // indices of segments, every parent before its daughters
	parent []int32 // of each segment; -1 of the root
	leaf   []bool
}

// Check tells whether the segments are a tree that can be computed: one root,
// every parent there, no cycle, every value within its range, and a terminal at
// every segment without daughters and at no other. Its error is a
// [*SegmentError].
func (n Network) Check() error {
	_, err := n.shape()
	return err
}

// Order gives the indices of the segments so that every parent stands before
// its daughters, and the index of each one's parent, -1 of the root.
func (n Network) Order() (order, parent []int, err error) {
	s, err := n.shape()
	if err != nil {
		return nil, nil, err
	}
	order, parent = make([]int, len(s.order)), make([]int, len(s.parent))
	for i := range order {
		order[i], parent[i] = int(s.order[i]), int(s.parent[i])
	}
	return order, parent, nil
}

func (n Network) shape() (shape, error) {
	if len(n.Segments) == 0 {
		return shape{}, &SegmentError{Index: -1, What: "a tree needs a segment"}
	}
	for i := range n.Segments {
		if err := n.checkValues(i); err != nil {
			return shape{}, err
		}
	}
	if err := n.checkBlood(); err != nil {
		return shape{}, err
	}
	s := shape{parent: make([]int32, len(n.Segments)), leaf: make([]bool, len(n.Segments))}
	root, err := n.findParents(s.parent)
	if err != nil {
		return shape{}, err
	}
	n.findOrder(&s, root)
	if len(s.order) < len(n.Segments) {
		return shape{}, n.cycle(s)
	}
	for i, seg := range n.Segments {
		switch {
		case s.leaf[i] && seg.Terminal == nil:
			return shape{}, n.fault(i, "give it r2, 0 or inf where that is meant", "has no daughters and no terminal: r2 is missing")
		case !s.leaf[i] && seg.Terminal != nil:
			return shape{}, n.fault(i, "leave r1, c and r2 blank", "has daughters and a terminal")
		}
	}
	return s, nil
}

// findParents fills the index of each segment's parent, and returns the root.
func (n Network) findParents(parent []int32) (root int, err error) {
	index := make(map[string]int32, len(n.Segments))
	for i, seg := range n.Segments {
		if first, twice := index[seg.ID]; twice {
			return 0, n.fault(i, "", "its id is also that of segment %d of the table", first+1)
		}
		index[seg.ID] = int32(i)
	}
	root = -1
	for i, seg := range n.Segments {
		if seg.Parent == "" {
			if root >= 0 {
				return 0, n.fault(i, "give all but one a parent", "is a second root beside %q", n.Segments[root].ID)
			}
			root, parent[i] = i, -1
			continue
		}
		p, ok := index[seg.Parent]
		if !ok {
			hint := ""
			if seg.Parent == "0" {
				hint = "leave the parent of the root blank"
			}
			return 0, n.fault(i, hint, "its parent %q is not in the table", seg.Parent)
		}
		parent[i] = p
	}
	return root, nil
}

// findOrder lists the segments that hang on the root, generation by generation.
func (n Network) findOrder(s *shape, root int) {
	count := len(n.Segments)
	first, next := make([]int32, count), make([]int32, count) // daughters as linked lists
	for i := range first {
		first[i] = -1
	}
	for i := count - 1; i >= 0; i-- {
		if p := s.parent[i]; p >= 0 {
			next[i], first[p] = first[p], int32(i)
		}
	}
	for i := range s.leaf {
		s.leaf[i] = first[i] < 0
	}
	if root < 0 {
		return
	}
	s.order = make([]int32, 1, count)
	s.order[0] = int32(root)
	for at := 0; at < len(s.order); at++ {
		for d := first[s.order[at]]; d >= 0; d = next[d] {
			s.order = append(s.order, d)
		}
	}
}

// cycle is the error of a network some segments of which do not hang on a root.
func (n Network) cycle(s shape) error {
	reached := make([]bool, len(n.Segments))
	for _, i := range s.order {
		reached[i] = true
	}
	for i := range n.Segments {
		if reached[i] {
			continue
		}
		// Up from here it can only go round: mark until a mark is met.
		for seen := make(map[int]bool); !seen[i]; i = int(s.parent[i]) {
			seen[i] = true
		}
		return n.fault(i, "give one of them another parent", "is its own ancestor: a cycle through %q", n.Segments[i].Parent)
	}
	panic("tree: no segment is out of reach")
}

func (n Network) fault(i int, hint, format string, args ...any) error {
	return &SegmentError{Index: i, ID: n.Segments[i].ID, What: fmt.Sprintf(format, args...), Hint: hint}
}
