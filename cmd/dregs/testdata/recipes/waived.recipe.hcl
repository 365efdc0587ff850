# Invented plant. The gypsum is known and accepted.
recipe "invented accepted haze" {
  revision = "A"
}
tank "T-1" { capacity = "3 m3" }
stage "make" {
  charge "water" { volume = "1000 L" }
  charge "calcium nitrate tetrahydrate" { mass = "100 kg" }
  charge "magnesium sulfate heptahydrate" { mass = "50 kg" }
  waive "SOL-01" {
    phase     = "gypsum"
    because   = "cleared by trial 14"
    until     = "2027-06-30"
    reference = "CC-118"
  }
}
