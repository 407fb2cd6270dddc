package app

import (
	"time"

	tea "github.com/charmbracelet/bubbletea"
)

// aMoment is how long a key waits for the commands it has given rise to. Most
// only carry a change of the case or a word for the status line; taken at once,
// they precede the next key, which may come in the same read: "i" then "q" asks
// about the choice just made, and five steps are five.
const aMoment = 10 * time.Millisecond

// atOnce runs the command of a key and takes what it returns within a moment.
// The rest, work that takes longer, is left to the command returned.
func (m Model) atOnce(cmd tea.Cmd) (Model, tea.Cmd) {
	if cmd == nil {
		return m, nil
	}
	over := time.NewTimer(m.moment)
	defer over.Stop()
	var rest []tea.Cmd
	for results := []<-chan tea.Msg{begin(cmd)}; len(results) > 0; results = results[1:] {
		select {
		case msg := <-results[0]:
			if batch, ok := msg.(tea.BatchMsg); ok {
				for _, cmd := range batch {
					results = append(results, begin(cmd))
				}
				continue
			}
			var cmd tea.Cmd
			m, cmd = m.takeNow(msg)
			rest = append(rest, cmd)
		case <-over.C:
			for _, r := range results {
				rest = append(rest, func() tea.Msg { return <-r })
			}
			return m, tea.Batch(rest...)
		}
	}
	return m, tea.Batch(rest...)
}

// begin runs a command beside the program.
func begin(cmd tea.Cmd) <-chan tea.Msg {
	result := make(chan tea.Msg, 1)
	if cmd == nil {
		result <- nil
		return result
	}
	run := guard(cmd)
	go func() { result <- run() }()
	return result
}

// takeNow takes a message of a screen; any other is for Bubble Tea.
func (m Model) takeNow(msg tea.Msg) (Model, tea.Cmd) {
	switch msg := msg.(type) {
	case nil:
		return m, nil
	case fromScreen, faultMsg:
		return m.update(msg)
	}
	return m, func() tea.Msg { return msg }
}
