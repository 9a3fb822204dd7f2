package report

import (
	"runtime"
	"sync"
)

// spread calls do for 0 to n−1, side by side on the machine's cores. Each call writes to
// places of its own, so that the result does not depend on how many cores there are. A panic
// in one of them comes out here, as it would without the cores.
func spread(n int, do func(i int)) {
	workers := min(runtime.GOMAXPROCS(0), n)
	var wg sync.WaitGroup
	var mu sync.Mutex
	var failed interface{}
	next := 0
	for range workers {
		wg.Add(1)
		go func() {
			defer wg.Done()
			defer func() {
				if p := recover(); p != nil {
					mu.Lock()
					failed = p
					mu.Unlock()
				}
			}()
			for {
				mu.Lock()
				i := next
				next++
				mu.Unlock()
				if i >= n {
					return
				}
				do(i)
			}
		}()
	}
	wg.Wait()
	if failed != nil {
		panic(failed)
	}
}

// spreadRows makes the rows of a table, each on any core, in order.
func spreadRows(n int, row func(i int) []Cell) [][]Cell {
	rows := make([][]Cell, n)
	spread(n, func(i int) { rows[i] = row(i) })
	return rows
}
