package units

import (
	"errors"
	"strings"
)

// A Message is a sentence with quantities in it, which each reader sees in
// their own units. Every "{}" of Format is filled by the next argument.
type Message struct {
	Format string
	Args   []Arg
}

// An Arg is a quantity, or a message of its own when Inner is set.
type Arg struct {
	Quantity Quantity
	SI       float64 // in the SI unit of Quantity
	Inner    *Message
}

// Of is an argument of the quantity q with the value si in its SI unit.
func Of(q Quantity, si float64) Arg { return Arg{Quantity: q, SI: si} }

// Text is an argument that is text already.
func Text(s string) Arg { return Nest(Message{Format: s}) }

// Nest is an argument that is a message, read in the units of the one it stands in.
func Nest(m Message) Arg { return Arg{Inner: &m} }

// Say makes a message.
func Say(format string, args ...Arg) Message { return Message{format, args} }

// In writes the message with its quantities in the units of sys.
func (m Message) In(sys System) string {
	var b strings.Builder
	rest := m.Format
	for _, a := range m.Args {
		before, after, found := strings.Cut(rest, "{}")
		b.WriteString(before)
		if !found {
			return b.String()
		}
		if a.Inner != nil {
			b.WriteString(a.Inner.In(sys))
		} else {
			b.WriteString(sys.Format(a.Quantity, a.SI))
		}
		rest = after
	}
	b.WriteString(rest)
	return b.String()
}

// Numbers lists the quantities of the message in the order in which it names them, those of inner messages too.
func (m Message) Numbers() []Arg {
	var list []Arg
	for _, a := range m.Args {
		if a.Inner != nil {
			list = append(list, a.Inner.Numbers()...)
			continue
		}
		list = append(list, a)
	}
	return list
}

// Empty reports whether there is nothing to say.
func (m Message) Empty() bool { return m.Format == "" }

// Explained is an error that can say itself in any unit system.
type Explained interface {
	error
	Message() Message
}

// Explain is the message of the first Explained error in err's tree, or err's
// own text. A nil err gives the empty message.
func Explain(err error) Message {
	if err == nil {
		return Message{}
	}
	var e Explained
	if errors.As(err, &e) {
		return e.Message()
	}
	return Message{Format: strings.ReplaceAll(err.Error(), "{}", "")}
}

// Errorf makes an Explained error that wraps cause, which may be nil.
func Errorf(cause error, format string, args ...Arg) error {
	return &messageError{Say(format, args...), cause}
}

type messageError struct {
	message Message
	cause   error
}

func (e *messageError) Error() string    { return e.message.In(Metric) }
func (e *messageError) Message() Message { return e.message }
func (e *messageError) Unwrap() error    { return e.cause }
