package propeller

import "slices"

// Given lists the advance ratios of the rows that the table was made of,
// dimensionless and rising, as far as Range goes.
func (p *Fixed) Given() []float64 {
	_, high := p.Range()
	list := slices.Clone(p.given)
	for len(list) > 0 && list[len(list)-1] > high {
		list = list[:len(list)-1]
	}
	return list
}
