# Invented plant. Calcium and sulfate meet: gypsum.
recipe "invented nutrient stock" {
  revision = "B"
  batch    = "1000 L"
}
tank "T-1" {
  capacity   = "3 m3"
  least_fill = "0.2 m3"
}
stage "make" {
  tank = "T-1"
  charge "water" { volume = "1000 L" }
  charge "calcium nitrate tetrahydrate" { mass = "100 kg +- 0.5 kg" }
  dose "magnesium sulfate heptahydrate" {
    mass = "50 kg"
    over = "20 min"
  }
  hold { for = "30 min" }
}
