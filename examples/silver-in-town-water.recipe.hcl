# Photographic silver rinse, invented plant. dregs: SOL-01 silver chloride
# The town water's 30 mg/L of chloride take silver with them: 0.12 g/L as AgCl.
recipe "silver nitrate rinse" {
  revision = "A"
  uses     = ["stock/site.stock.hcl"]
}

stage "water" {
  tank = "T-101"
  charge "town" { volume = "500 L" }
  adjust {
    ph      = 5.0
    with    = "nitric acid 65 %"
    at_most = "2 kg"
  }
}

stage "silver" {
  tank = "T-101"
  charge "silver nitrate" { mass = "0.5 kg" } # faults here
  hold { for = "10 min" }
}
