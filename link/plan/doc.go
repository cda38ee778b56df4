// Package plan reads the plan file, the one YAML document a job is described in, and runs it.
//
// [Parse] turns a file into a [Plan], reporting everything that is wrong with it at once, each
// with its line and column. The shape of the file is the set of Go structs in shape_*.go: their
// json and jsonschema tags drive the strict decoder and the published JSON Schema alike, so
// that both accept and refuse the same files. [Plan.Open] opens the ground and resolves names
// into stations and links; [Network.Run] and [Network.Section] compute.
package plan
