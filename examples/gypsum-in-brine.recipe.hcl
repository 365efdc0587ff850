# Salt refining, invented plant. dregs: clear
# 25 mmol/kg of calcium and of sulfate are above what water holds of gypsum
# (15 mmol/kg) and below what 2 mol/kg of salt hold: three times as much.
recipe "brine with gypsum" {
  revision = "C"
  uses     = ["stock/site.stock.hcl"]
}

stage "brine" {
  tank = "T-101"
  charge "water" {
    mass        = "1000 kg"
    temperature = "28 degC"
  }
  charge "sodium chloride" { mass = "117 kg" }
  hold { for = "20 min" }
}

stage "trim" {
  tank = "T-101"
  charge "calcium chloride dihydrate" { mass = "3.7 kg" }
  charge "sodium sulfate" { mass = "3.55 kg" }
  hold { for = "15 min" }
  transfer {
    to  = "T-102"
    all = true
  }
}
