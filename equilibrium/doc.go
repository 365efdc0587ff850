// Package equilibrium computes the state of an aqueous liquor: what is
// dissolved and as what, which solids stand in it, its pH, water activity,
// density and what gases press to leave it. It knows nothing of tanks, recipes
// or files.
//
// # Model
//
// A liquor is given by its totals: moles of each component (Morel and Hering
// tableau; H^+ and H2O are components), all of it summed over solution and
// solids. Since everything that can be charged is neutral, electroneutrality
// follows from the totals and is a check, not an equation.
//
//	n_i = W · exp(ln K_i(T) + Σ_c ν_ic λ_c − ln γ_i)   moles of species i
//	λ_c                                                 ln activity of component c
//	W                                                   kg of free water
//	SI_p = (Σ_c ν_pc λ_c − ln K_p) / ln 10              saturation index of solid p
//
// The λ minimise the dual φ(λ) = Σ n_i − b·λ under SI_p ≤ 0; the multipliers
// are the moles of solid. See [Solver].
//
// # Units
//
// Temperature in kelvin (tempK), amounts in mol, molality in mol per kg water,
// masses in kg (massKg) and volumes in litres (volumeL); pressures in bar where
// they enter an equilibrium constant (named bar) and in kPa or Pa only where a
// name says so. Standard state: 1 mol/kg, 1 bar.
//
// # Reading order
//
//   - elements.go, formula.go: atomic weights and chemical formulas
//   - reaction.go, logk.go: reactions and their constants against temperature
//   - database.go, read.go: the tables under tables/, loaded once
//   - water.go, density.go: properties of water and of liquors
//   - activity.go: activity coefficients (extended Debye-Hückel with specific
//     ion interaction terms)
//   - system.go, state.go: what can form, and what did
//   - solver.go (the method), pose.go (its index tables), start.go (where it
//     starts), qp.go, anderson.go (its two tools), report.go (the answer)
package equilibrium
