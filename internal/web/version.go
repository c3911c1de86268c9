package web

import "runtime/debug"

// Build names the program as it was built: its version, else the commit, marked where files differed from it.
func Build() string {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		return "unknown"
	}
	settings := map[string]string{}
	for _, s := range info.Settings {
		settings[s.Key] = s.Value
	}
	version := info.Main.Version
	if revision := settings["vcs.revision"]; revision != "" {
		version = revision[:min(12, len(revision))]
		if settings["vcs.modified"] == "true" {
			version += "-modified"
		}
	}
	if version == "" {
		return "unknown"
	}
	return version
}
