package response

import (
	"context"
	"runtime"
	"sync"
	"sync/atomic"
)

// each calls do for 0 <= k < n on all processors; every k has one owner, so that the results do not depend on their number.
// fresh makes the working memory of one worker. It stops early where the context ends.
func each[W any](ctx context.Context, n int, fresh func() W, do func(w W, k int), done func(k int)) error {
	var next, finished atomic.Int64
	var group sync.WaitGroup
	var report sync.Mutex
	reported := 0
	for range min(runtime.GOMAXPROCS(0), max(n, 1)) {
		group.Add(1)
		go func() {
			defer group.Done()
			w := fresh()
			for ctx.Err() == nil {
				k := int(next.Add(1)) - 1
				if k >= n {
					return
				}
				do(w, k)
				if c := int(finished.Add(1)); done != nil && c%64 == 0 {
					report.Lock()
					if c > reported { // another worker may have been quicker
						reported = c
						done(c)
					}
					report.Unlock()
				}
			}
		}()
	}
	group.Wait()
	return ctx.Err()
}
