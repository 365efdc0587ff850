# Fine chemicals, invented plant. dregs: DIS-01 niter
# Potassium nitrate takes up heat: in unheated water the tank cools to about 7 °C
# and two thirds of the charge stay on the bottom.
recipe "saltpetre, charged cold" {
  revision = "A"
  uses     = ["stock/site.stock.hcl"]
}

stage "charge" {
  tank = "T-101"
  charge "water" { mass = "800 kg" }
  charge "potassium nitrate" { mass = "400 kg" } # faults here
}

stage "warm" {
  tank = "T-101"
  heat {
    to   = "45 degC"
    over = "40 min"
  }
  hold { for = "20 min" }
}
