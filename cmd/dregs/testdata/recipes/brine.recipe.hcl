# Invented plant. Nothing to find.
recipe "invented weak brine" {
  revision = "A"
}
parameter "salt" { value = "10 kg" }
tank "T-2" { capacity = "2 m3" }
stage "make" {
  charge "water" { volume = "1000 L" }
  charge "sodium chloride" { mass = param["salt"] }
  heat { to = "40 degC" }
}
