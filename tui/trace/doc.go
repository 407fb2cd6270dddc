// Package trace is a window on a long recording, with a cursor: a component
// that the screens of intake and beats share. It knows samples, times and
// marks, and no channel.
//
// What is drawn, a [chart.Plot] of one value a column, is prepared in a command
// and kept by source, window and size, so that a view costs the drawing alone
// and going back costs nothing. Until a new window is ready the old one stays.
// A prepared picture carries what it was made from; one that is no longer
// wanted is kept for later and not shown.
//
// Where a column holds more than half a second, so that beats cannot be told
// apart, the lowest and the highest value of each column are drawn.
//
// The cursor is a sample, and who shows it gives it to View as a mark, so that a
// step changes one row of the picture and few bytes are sent. It moves by columns of the picture; where it leaves
// the window, the window follows by half its length.
package trace
