package web

// Routes lists the paths that the service answers, for gateways that route by themselves. A part in braces stands for one segment.
func Routes() []string {
	var paths []string
	for _, r := range routes() {
		paths = append(paths, r.pattern)
	}
	return paths
}
