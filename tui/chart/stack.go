package chart

// Stack is two plots over one x axis: Lower, the residual, stands below Main
// and carries the axis. Both use the x range of Main and one width of labels.
// Cursors and marks stay with the plot that has them.
type Stack struct{ Main, Lower Plot }

// The lower plot gets a third of the height, and never less than fits it.
const leastLower = 6

// Draw draws both in exactly height lines of at most width cells.
func (s Stack) Draw(width, height int, t Theme) string {
	main, lower, above := s.arrange(height)
	if columns, _, _ := s.Area(width, height); columns == 0 {
		return notice("too small for two plots", width, height)
	}
	return main.Draw(width, above, t) + "\n" + lower.Draw(width, height-above, t)
}

// Area is how many columns both have, and the lines that each has for its
// curves; all 0 where there is no room.
func (s Stack) Area(width, height int) (columns, mainLines, lowerLines int) {
	main, lower, above := s.arrange(height)
	columns, mainLines = main.Area(width, above)
	_, lowerLines = lower.Area(width, height-above)
	if mainLines == 0 || lowerLines == 0 {
		return 0, 0, 0
	}
	return columns, mainLines, lowerLines
}

// arrange gives both plots one x range and one label width, and Main its lines.
func (s Stack) arrange(height int) (main, lower Plot, above int) {
	main, lower = s.Main, s.Lower
	main.noX = true
	lower.X = main.X
	above = height - max(height/3, leastLower)
	width := max(main.labelWidth(above), lower.labelWidth(height-above))
	main.LabelWidth, lower.LabelWidth = width, width
	return main, lower, above
}
