# Nutrient stock for greenhouses, invented plant. dregs: SOL-01 gypsum
# Calcium nitrate and magnesium sulfate in one tank: nearly all of the sulfate
# comes down as gypsum. Two tanks are the way out.
recipe "nutrient stock, one tank" {
  revision = "A"
  batch    = "1000 L"
}

tank "N-1" {
  capacity   = "1.2 m3"
  least_fill = "0.1 m3"
}

stage "dissolve" {
  charge "demineralised water" { volume = "950 L" }
  charge "calcium nitrate tetrahydrate" { mass = "100 g/L" }
  hold { for = "15 min" }
}

stage "magnesium" {
  dose "magnesium sulfate heptahydrate" { # faults here
    mass = "50 g/L"
    over = "20 min"
  }
  hold { for = "15 min" }
}
