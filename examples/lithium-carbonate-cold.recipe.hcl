# Battery metals, invented plant. dregs: SOL-02 zabuyelite
# Lithium carbonate is less soluble hot. Precipitated at 20 °C it falls short of
# the 88 % that the batch record asks for; at 90 °C it would not.
recipe "lithium carbonate, cold" {
  revision = "A"
  uses     = ["stock/site.stock.hcl"]
}

stage "lithium liquor" {
  tank = "T-101"
  charge "water" { mass = "800 kg" }
  charge "lithium chloride" { mass = "68 kg" }
  cool { to = "25 degC" }
}

stage "precipitate" {
  tank = "T-101"
  charge "sodium carbonate" { mass = "85 kg" }
  cool { to = "20 degC" }
  expect "lithium carbonate" { at_least = "88 %" } # faults here
}
