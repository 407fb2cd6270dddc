package data

import (
	"fmt"
	"slices"

	"afterbeat/data/unit"
)

// Roles are the columns that the user has named, by their whole header or the
// part before the unit. Where one is empty, [Choose] guesses.
type Roles struct{ Pressure, Flow, Velocity string }

// Selection says which channels were chosen, as indices; -1 where there is
// none. Where nothing was named, only one of Flow and Velocity is set.
type Selection struct {
	Pressure, Flow, Velocity int
	Guessed                  []Warning // one for each channel that was guessed
}

// WrongRoleError says that a channel was named for a role which its quantity
// does not fit.
type WrongRoleError struct {
	Name     Text
	Quantity unit.Quantity
	Role     string
	Flag     string // the flag that states the unit
}

func (e *WrongRoleError) Error() string {
	return fmt.Sprintf("%s is of quantity %s, not %s; state its unit with %s", e.Name, e.Quantity, e.Role, e.Flag)
}

// Choose settles which channels are used. A name rules. Else the candidates
// for a role are the channels of its quantity, without those that no guess
// takes (see neverGuessed), and the uncalibrated ones only if there is no
// other. Of several, the pressure that shares its site with the flow is taken;
// else root before limb: the root, then names that say "arterial" (abp, art),
// then names that say nothing, then named arteries. The same order holds for
// flows and velocities, a site shared with a named pressure coming first and
// one shared with the only pressure last. A flow rules over a velocity.
//
// What is still equal gives an [*AmbiguousError], a name that does not exist
// an [*UnknownNameError], a name of another quantity a [*WrongRoleError].
func Choose(channels []Channel, r Roles) (Selection, error) {
	c := chooser{channels: channels, named: [3]int{-1, -1, -1}}
	for role, name := range [3]string{r.Pressure, r.Flow, r.Velocity} {
		if err := c.name(role, name); err != nil {
			return Selection{}, err
		}
	}
	moving, err := c.guessMoving()
	if err != nil {
		return Selection{}, err
	}
	s := Selection{Pressure: c.named[pressure], Flow: c.named[flow], Velocity: c.named[velocity]}
	if s.Pressure < 0 {
		if s.Pressure, err = c.guess(pressure, c.pressureKey(moving)); err != nil {
			return Selection{}, err
		}
		s.Guessed = append(s.Guessed, c.guessed(pressure, s.Pressure)...)
	}
	if s.Flow < 0 && s.Velocity < 0 && moving >= 0 {
		role := flow
		if s.Flow = moving; channels[moving].Quantity == unit.Velocity {
			role, s.Flow, s.Velocity = velocity, -1, moving
		}
		s.Guessed = append(s.Guessed, c.guessed(role, moving)...)
	}
	return s, nil
}

// The roles, as indices of chooser.named.
const (
	pressure = iota
	flow
	velocity
)

var roleNames = [3]string{"pressure", "flow", "velocity"}

type chooser struct {
	channels []Channel
	named    [3]int // the channels that the user named, -1 where he did not
}

// name settles a role by the name that the user gave; an empty one is no name.
func (c *chooser) name(role int, name string) error {
	if name == "" {
		return nil
	}
	i, err := FindChannel(c.channels, name, "--"+roleNames[role]+" NAME")
	if err != nil {
		return err
	}
	ch := c.channels[i]
	if string(ch.Quantity) != roleNames[role] {
		example := unit.Internal(unit.Quantity(roleNames[role])).Name
		return &WrongRoleError{ch.Name, ch.Quantity, roleNames[role], "--unit " + shellWord(ch.Name.String()) + "=" + example}
	}
	c.named[role] = i
	return nil
}

// FindChannel is the index of the channel that the user calls name, by its
// whole header or the part before the unit. Where there is none, or several,
// the error names flag, the flag that gave the name.
func FindChannel(channels []Channel, name, flag string) (int, error) {
	in := make([]title, len(channels))
	for i, ch := range channels {
		part, _, _ := unit.Header(ch.Name.String())
		in[i] = title{ch.Name, Clean(part)}
	}
	return find(name, in, flag)
}

// guessMoving gives the named flow, else the named velocity, else guesses one
// of either: a calibrated flow, a calibrated velocity, then uncalibrated ones.
func (c *chooser) guessMoving() (int, error) {
	for _, role := range []int{flow, velocity} {
		if c.named[role] >= 0 {
			return c.named[role], nil
		}
	}
	role := velocity
	flows, velocities := c.candidates(flow), c.candidates(velocity)
	if len(flows) > 0 && (len(velocities) == 0 || c.channels[flows[0]].Unit.Calibrated || !c.channels[velocities[0]].Unit.Calibrated) {
		role = flow
	}
	return c.guess(role, c.movingKey())
}

// candidates lists the channels that a guess may give a role: calibrated ones,
// or uncalibrated ones if there is no other.
func (c *chooser) candidates(role int) []int {
	var all, calibrated []int
	for i, ch := range c.channels {
		if string(ch.Quantity) != roleNames[role] || neverGuessed(ch) {
			continue
		}
		all = append(all, i)
		if ch.Unit.Calibrated {
			calibrated = append(calibrated, i)
		}
	}
	if len(calibrated) > 0 {
		return calibrated
	}
	return all
}

// guess takes the candidate with the smallest key, -1 if there is none.
func (c *chooser) guess(role int, key func(Channel) [3]int) (int, error) {
	var best []int
	for _, i := range c.candidates(role) {
		if len(best) > 0 {
			a, b := key(c.channels[i]), key(c.channels[best[0]])
			switch slices.Compare(a[:], b[:]) {
			case 1:
				continue
			case -1:
				best = best[:0]
			}
		}
		best = append(best, i)
	}
	switch len(best) {
	case 0:
		return -1, nil
	case 1:
		return best[0], nil
	}
	e := &AmbiguousError{Role: roleNames[role], Flag: "--" + roleNames[role] + " NAME"}
	for _, i := range best {
		e.Names = append(e.Names, c.channels[i].Name)
	}
	return -1, e
}

// pressureKey orders pressures beside the chosen flow or velocity.
func (c *chooser) pressureKey(moving int) func(Channel) [3]int {
	return func(ch Channel) [3]int {
		shared := 1
		if moving >= 0 && sharesSite(ch, c.channels[moving]) {
			shared = 0
		}
		return [3]int{shared, nearness(ch), 0}
	}
}

// movingKey orders flows and velocities.
func (c *chooser) movingKey() func(Channel) [3]int {
	only := -1
	if p := c.candidates(pressure); len(p) == 1 {
		only = p[0]
	}
	return func(ch Channel) [3]int {
		key := [3]int{1, nearness(ch), 1}
		if n := c.named[pressure]; n >= 0 && sharesSite(ch, c.channels[n]) {
			key[0] = 0
		}
		if only >= 0 && sharesSite(ch, c.channels[only]) {
			key[2] = 0
		}
		return key
	}
}

// guessed is the warning that channel i was taken for a role, none if i is -1.
func (c *chooser) guessed(role, i int) []Warning {
	if i < 0 {
		return nil
	}
	return []Warning{{
		Code: CodeGuessedRole, Channel: c.channels[i].Name,
		Text: fmt.Sprintf("%s was taken for the %s, by its name", c.channels[i].Name, roleNames[role]),
		Cure: fmt.Sprintf("state it with --%s %s, or another column", roleNames[role], shellWord(c.channels[i].Name.String())),
	}}
}
