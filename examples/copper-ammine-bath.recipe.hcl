# Metal finishing, invented plant. dregs: clear
# Copper stays in solution as its ammine although [Cu][OH]² is far above the
# solubility product of the hydroxide: the free copper is a millionth of the total.
recipe "copper ammine bath" {
  revision = "B"
  uses     = ["stock/site.stock.hcl"]
}

material "ammonia 25" {
  contents = { NH3 = "25 wt%" }
  density  = "0.910 kg/L"
}

stage "make up" {
  tank = "T-101"
  charge "water" { volume = "600 L" }
  charge "ammonium chloride" { mass = "60 kg" }
  charge "ammonia 25" { mass = "170 kg" }
}

stage "copper" {
  tank = "T-101"
  dose "copper(II) chloride dihydrate" {
    mass = "10 kg"
    over = "15 min"
  }
  hold { for = "20 min" }
  sample { Cu = ["3 g/L", "6 g/L"] }
}
