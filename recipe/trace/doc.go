// Package trace walks a recipe through its tanks: what is in each tank after
// every step, in equilibrium, and what might have been on the way (at the feed
// point, at the coldest place, after meeting the air, after ageing). It finds
// nothing wrong with anything; the rules of package checks read the trace.
package trace
