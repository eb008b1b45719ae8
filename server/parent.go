package server

import "time"

// parentEvery is how often the server looks whether its client still runs.
const parentEvery = 3 * time.Second

// followParent ends the session when the process that started it is gone: a
// client that was killed closes its pipes, but one on the other end of a
// socket need not.
func (s *session) followParent(pid int) {
	s.repeatedly(parentEvery, "parent", func() {
		if !alive(pid) {
			s.logger.Printf("process %d, which started the server, has ended", pid)
			s.stop()
		}
	})
}
