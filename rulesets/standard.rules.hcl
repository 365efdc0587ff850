# The standard ruleset. A site's own file has the same form; it names only what it
# wants otherwise, and only what stands here can be named.
#
#   dregs check --rules site.rules.hcl

ruleset "standard" {
  revision = "1"
}

limits {
  haze              = "5 mg/L"   # solid below this is a note: hardly seen in a glass; common practice, no source
  bloom             = "50 mg/L"  # a stop of an unplanned solid below this is a caution: a bloom that filters off; common practice, no source
  zone_sparing      = 0.3        # saturation index below which a sparingly soluble solid may stay away for a while; common practice, no source
  zone_soluble      = 0.03       # the same for a very soluble salt; common practice, no source
  feed_index        = 0.5        # peak saturation index on the mixing line that is worth telling; common practice, no source
  dissolve_margin   = "5 %"      # of its solubility, that a charge should stay away from; common practice, no source
  air_solid         = "300 mg/L" # solid after meeting the air, above which it is a caution; common practice, no source
  imbalance_note    = "5 %"      # of a water analysis: Standard Methods 1030 E, from memory
  imbalance_caution = "10 %"     # common practice, no source
  gas               = "1 L"      # gas given off, at 20 °C, that is worth telling; common practice, no source
}

# Levels by code, in place of those of the rules: stop, caution or note. The
# standard set leaves every rule at its own.
levels {}
