# Formulation of a cleaner, invented plant. dregs: clear
# Calcium 10 mmol/L beside carbonate at pH 9 would be calcite; EDTA holds the
# calcium, so there is none to speak of to meet the carbonate.
recipe "chelated cleaner base" {
  revision = "A"
  uses     = ["stock/site.stock.hcl"]
}

stage "chelate" {
  tank = "T-101"
  charge "water" { volume = "900 L" }
  charge "tetrasodium EDTA" { mass = "5.5 kg" }
  charge "calcium chloride dihydrate" { mass = "1.32 kg" }
  hold { for = "10 min" }
}

stage "build" {
  tank = "T-101"
  dose "sodium carbonate" {
    mass = "0.95 kg"
    over = "10 min"
  }
  adjust {
    ph      = 9.0
    with    = "hydrochloric 32"
    at_most = "8 kg"
  }
  sample { ph = ["8.8", "9.2"] }
}
