// Package web serves a plan to a browser on the same machine: an API that answers what the
// commands answer, for the plan as it stands in its file and for changes tried without saving;
// terrain tiles cut from the plan's rasters; and the page itself, which is embedded.
//
// Every version of the plan is named by a hash of its text. [Server] holds the last good version
// of the file and the versions tried since, on one open ground. It opens the files that the plan
// on disk names and no other: a text that comes from a client may not name new ones. Rasters that are
// replaced while they are served are read as they were; start the server again.
package web
