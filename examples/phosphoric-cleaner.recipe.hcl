# Food plant cleaning, invented plant. dregs: clear
# Hard water with phosphoric acid: at pH 2 nearly all phosphate is H2PO4^- and
# H3PO4, so calcium phosphate does not come down although there is plenty of both.
recipe "phosphoric acid cleaner in hard water" {
  revision = "A"
  batch    = "1000 L"
  uses     = ["stock/site.stock.hcl"]
}

stage "acid" {
  tank = "T-101"
  charge "town" { volume = "950 L" }
  dose "phosphoric acid 75 %" {
    mass = "20 g/L"
    over = "10 min"
  }
  heat { to = "40 degC" }
  sample { ph = ["1.5", "2.5"] }
}

stage "use" {
  tank = "T-101"
  make_up "town" { to = "1000 L" }
  hold { for = "30 min" }
}
