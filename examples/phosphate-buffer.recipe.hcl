# Buffer preparation, invented laboratory. dregs: clear
# Equimolal phosphate in demineralised water; the reference value at 25 °C is
# pH 6.865 (IUPAC).
recipe "phosphate buffer 0.025 mol/kg" {
  revision = "A"
}

tank "B-1" {
  capacity  = "120 L"
  headspace = "nitrogen"
}

stage "dissolve" {
  charge "demineralised water" {
    mass        = "100 kg"
    temperature = "25 degC"
  }
  charge "KH2PO4" { mass = "340.2 g" }
  charge "Na2HPO4" { mass = "354.9 g" }
}

stage "release" {
  heat { to = "25 degC" }
  sample { ph = ["6.84", "6.89"] }
}
