# Water treatment, invented plant. dregs: clear
# Struvite is planned: at pH 8.8 nearly all phosphate comes down with magnesium
# and ammonium, and is filtered off.
recipe "struvite recovery" {
  revision = "D"
  uses     = ["stock/site.stock.hcl"]
}

stage "feed" {
  tank = "T-101"
  charge "softened" { volume = "1000 L" }
  charge "ammonium chloride" { mass = "3.06 kg" }
  charge "sodium dihydrogen phosphate dihydrate" { mass = "1.0 kg" }
}

stage "precipitate" {
  tank = "T-101"
  charge "magnesium chloride hexahydrate" { mass = "1.57 kg" }
  adjust {
    ph      = 8.8
    with    = "caustic 50"
    at_most = "20 kg"
  }
  expect "struvite" { at_least = "80 %" }
  hold { for = "45 min" }
  filter { to = "T-102" }
}
