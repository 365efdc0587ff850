# Stock of the invented site "Lower Weir": waters, tanks and materials that its
# recipes share. Nothing here is a real plant.

water "town" {
  temperature = "12 degC"
  ph          = 7.5
  contents = {
    Ca = "82 mg/L", Mg = "6 mg/L", Na = "21 mg/L", Cl = "30 mg/L", SO4 = "45 mg/L"
    alkalinity = "192 mg/L as CaCO3"
    SiO2       = "12 mg/L"
  }
}

water "softened" {
  temperature = "14 degC"
  ph          = 7.6
  contents = {
    Ca = "1 mg/L", Na = "127 mg/L", Cl = "30 mg/L", SO4 = "45 mg/L"
    alkalinity = "192 mg/L as CaCO3"
    SiO2       = "12 mg/L"
  }
}

material "caustic 50" {
  contents = { NaOH = "50 wt% +- 0.5 wt%" } # the rest is water
  density  = "1.525 kg/L"
}

material "hydrochloric 32" {
  contents = { HCl = "32 wt%" }
  density  = "1.159 kg/L"
}

tank "T-101" {
  capacity   = "1.5 m3"
  least_fill = "0.2 m3"
  rating     = ["5 degC", "90 degC"]
}

tank "T-102" {
  capacity   = "1.5 m3"
  least_fill = "0.2 m3"
  rating     = ["5 degC", "90 degC"]
}
