// Package trace walks a recipe through its tanks: what is in each tank after
// every step, in equilibrium, and what might have been on the way (at the feed
// point, at the coldest place, after meeting the air, after ageing). It finds
// nothing wrong with anything; the rules of package checks read the trace.
//
// # What the walk assumes
//
//   - Every step ends in equilibrium. Solids that form fast may form; slow ones
//     only when they are there already, are charged, or the batch is aged.
//   - A tank is well mixed; nothing loses heat. Temperatures of mixing follow
//     from heat capacities and the heat of solution of the charge.
//   - In ordinary steps the liquor exchanges no gas with its headspace, except
//     that a gas that presses with more than 1.013 bar leaves as bubbles unless
//     the headspace is closed. Partial pressures given with a tank hold at every
//     step. A headspace of air acts in age, in sparge "air" and in a hold of 8 h
//     or more; elsewhere Step.Air holds the liquor as the air would make it.
//   - Evaporation takes water and nothing else: volatile acids, ammonia and
//     organics stay in the liquor.
//   - Inert matter counts 1.0 kg/L and goes with the liquor, through filters too.
//   - A wash displaces the liquor in the cake without mixing, what is more goes
//     through.
//   - What an assay leaves open is water.
//   - Iron in an analysis is Fe^2+ when it does not say more; phosphate of a
//     water is H2PO4^- at the end point of its alkalinity.
//
// # Reading order
//
// trace.go (the types), walk.go and steps.go (from step to step), liquor.go
// and mixing.go (contents of a tank and how they come to equilibrium),
// transfer.go, titrate.go (adjust, make up, evaporate), gas.go, dissolve.go and
// feed.go (what might have been); resolve.go, contents.go, names.go, waters.go, carbonate.go
// and own.go turn materials into components.
package trace
