# Invented plant. Two faults in one file.
recipe "invented muddle" {
  revision = "A"
}
tank "T-1" { capacity = "3 m3" }
stage "make" {
  charge "watr" { volume = "1000 L" }
  charge "sodium chloride" { mass = "10" }
}
