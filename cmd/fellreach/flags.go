package main

// A quantityFlag lets a quantity of a plan be given on the command line in the same spelling.
type quantityFlag struct {
	value interface{ Set(text string) error }
	text  string
}

func (q *quantityFlag) Set(text string) error {
	if err := q.value.Set(text); err != nil {
		return err
	}
	q.text = text
	return nil
}

func (q *quantityFlag) String() string { return q.text }

func (q *quantityFlag) Type() string { return "quantity" }
