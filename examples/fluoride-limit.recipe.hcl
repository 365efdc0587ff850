# Waste water of an etching shop, invented plant. dregs: LAB-01
# Fluorite is planned, but with calcium equal to fluoride it leaves about 8 mg/L;
# the permit says 5. More calcium is the way out.
recipe "fluoride removal" {
  revision = "A"
  uses     = ["stock/site.stock.hcl"]
}

stage "collect" {
  tank = "T-101"
  charge "water" { volume = "1000 L" }
  charge "sodium fluoride" { mass = "1.105 kg" }
}

stage "precipitate" {
  tank = "T-101"
  dose "calcium chloride dihydrate" {
    mass = "1.93 kg"
    over = "15 min"
  }
  expect "fluorite" { at_least = "0.9 kg" }
  hold { for = "30 min" }
  filter { to = "T-102" }
  sample {
    tank = "T-102"
    F    = { at_most = "5 mg/L" } # faults here
  }
}
