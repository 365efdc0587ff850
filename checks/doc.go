// Package checks holds the rules, one file each: code, text, and logic over a
// trace. The registry is a slice literal in registry.go.
package checks
