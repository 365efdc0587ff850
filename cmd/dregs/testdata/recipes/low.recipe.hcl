# Invented plant. The stirrer runs dry: a caution.
recipe "invented short batch" {
  revision = "A"
}
tank "T-3" {
  capacity   = "1 m3"
  least_fill = "200 L"
}
stage "fill" {
  charge "water" { volume = "150 L" }
  heat { to = "40 degC" }
}
