package sheet

import (
	"fmt"
	"strconv"
	"strings"
)

// A Family is a choice of rows by the text of one column (long form), or of columns by
// what stands behind the "@" in their heads (wide form).
type Family struct {
	Value string // in Mapping.Family
	Label string
}

// Families group what a sheet holds several of.
type Families struct {
	Label string
	List  []Family
}

// OfColumns begins the Value of a family of columns, which no number of a column does.
const OfColumns = "at "

// How many different texts a column may have to count as naming families, and how long each may be in bytes.
const (
	mostFamilies  = 60
	longestFamily = 80
)

// cutFamily parts "CT@3000 rpm" or "CT at 3000" into the name and what the column belongs to.
func cutFamily(head string) (name, of string) {
	for _, sign := range []string{"@", " at "} {
		if name, of, ok := strings.Cut(head, sign); ok && strings.TrimSpace(of) != "" && strings.TrimSpace(name) != "" {
			return strings.TrimSpace(name), strings.TrimSpace(of)
		}
	}
	return head, ""
}

// Families lists what rows or columns of the block can be chosen by.
func (b *Block) Families() []Families {
	var all []Families
	wide := Families{Label: "columns"}
	seen := map[string]bool{}
	for _, c := range b.Columns {
		if _, of := cutFamily(c.Name); of != "" && !seen[of] {
			seen[of] = true
			wide.List = append(wide.List, Family{OfColumns + of, "columns at " + clip(of)})
		}
	}
	if len(wide.List) > 1 {
		all = append(all, wide)
	}
	for i := range b.Columns {
		if list := b.texts(i); list != nil {
			all = append(all, Families{Label: clip(b.Label(i)), List: list})
		}
	}
	return all
}

// texts lists the different texts of a column when each stands, on the average, in two rows or more.
func (b *Block) texts(column int) []Family {
	counts := map[string]int{}
	var order []string
	for _, r := range b.Rows {
		c := r.Cell(column)
		if c == "" {
			continue
		}
		if counts[c] == 0 {
			order = append(order, c)
		}
		if counts[c]++; len(order) > mostFamilies || len(c) > longestFamily {
			return nil
		}
	}
	if len(order) < 2 || 2*len(order) > len(b.Rows) {
		return nil
	}
	list := make([]Family, len(order))
	for i, c := range order {
		list[i] = Family{fmt.Sprintf("%d=%s", column+1, c), fmt.Sprintf("%s %s (%s)", clip(b.Label(column)), clip(c), counted(counts[c], "row"))}
	}
	return list
}

// Has reports whether value is empty or one of the block's families.
func (b *Block) Has(value string) bool {
	if value == "" {
		return true
	}
	for _, f := range b.Families() {
		for _, one := range f.List {
			if one.Value == value {
				return true
			}
		}
	}
	return false
}

// chosen lists the rows of a family.
func (b *Block) chosen(value string) []Row {
	number, text, ok := strings.Cut(value, "=")
	if !ok || strings.HasPrefix(value, OfColumns) {
		return b.Rows
	}
	column, err := strconv.Atoi(number)
	if err != nil {
		return nil
	}
	var list []Row
	for _, r := range b.Rows {
		if r.Cell(column-1) == text {
			list = append(list, r)
		}
	}
	return list
}
