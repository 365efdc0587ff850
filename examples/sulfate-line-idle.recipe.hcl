# Pulp chemicals, invented plant. dregs: SAT-03 mirabilite
# 30 wt% sodium sulfate is clear at 45 °C; the transfer line idles at 15 °C, where
# water holds less than half of it.
recipe "sodium sulfate liquor" {
  revision = "B"
  uses     = ["stock/site.stock.hcl"]
}

tank "S-7" {
  capacity = "1.5 m3"
  coldest  = "15 degC"
}

stage "dissolve" {
  tank = "T-101"
  charge "water" {
    mass        = "700 kg"
    temperature = "45 degC"
  }
  charge "sodium sulfate" { mass = "300 kg" }
  heat { to = "45 degC" }
}

stage "store" {
  tank = "T-101"
  transfer {
    to  = "S-7"
    all = true
  }
  hold { # faults here
    for  = "12 h"
    tank = "S-7"
  }
}
