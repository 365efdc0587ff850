package checks

// The texts that "dregs why CODE" prints, in the order of the registry: what the
// finding means, how it is computed, what to do, when it is wrong.

const undissolvedText = `After the step some of the charge itself still stands as a solid, in balance with
the liquor: there is too little water for it, or the liquor is too cold. A charge
that takes up heat cools the tank, and that is counted where its heat of solution
is known.

The amount is that of the solid left at equilibrium. The least water and the least
temperature that would do are found by solving the equilibrium again with them.

Use more water or a warmer liquor, or charge less. Time does not help: this is
not about how fast it dissolves.

It is wrong when the material's solid is another one than the catalogue says, or
when the liquor is outside the range of the model (see TRUST-01).`

const nearLimitText = `The charge dissolves, but with less to spare than its weighing tolerance (or 5 %).

Computed from the saturation index of the charge's own solid after the step, as a
fraction of the mean ion concentration it could reach.

Use a little more water, or hold it a little warmer.

It is wrong when the weighing is known to be better than the tolerance written.`

const feedText = `Where a liquid feed enters, it meets the bulk in every proportion. Somewhere on
that line a solid may be oversaturated although it is not in the mixed tank.

Computed on twelve mixtures of feed and bulk at the temperature of the bulk, with
nothing allowed to come down; the worst phase is told, with where on the line.

When the bulk is well undersaturated with it, the solid dissolves again and this
is a note: a routine neutralisation is no fault.

Feed more slowly, more dilute, under the surface at the stirrer, or the other way
round.

It is wrong when the solid needs longer to form than the eddy lasts.`

const gasText = `More gas is dissolved than one atmosphere holds down, so it leaves as bubbles; or a
toxic gas stands over the liquor with more than 0.1 kPa.

Computed from Henry's law at the temperature of the step; the litres are at 20 °C.

Vent, exhaust, add slowly, leave room for foam. Carbon dioxide gathers low.

It is wrong about how fast the gas leaves: that is not computed.

This is no hazard study. Follow the site's safety procedures.`

const pairsText = `Two materials are in one tank, or about to be, that common practice keeps apart:
acid with cyanide, sulfide, hypochlorite or azide, hypochlorite with ammonia, and
so on. The list is short and says nothing about pairs that are not on it.

It goes by what was charged, not by what is left of it after reaction; an acid in
a liquor that has become alkaline is let pass, and a base in one that is neutral.

Ask whoever is responsible for safety before anything is charged.

This is no hazard study. Follow the site's safety procedures.`

const orderText = `The order of charging heats or spatters: water into concentrated sulfuric acid,
caustic flakes into warm water, and the like.

It goes by the classes of what is charged and of what makes up most of the tank.

Turn the order round, start colder, add slowly under stirring.

This is no hazard study. Follow the site's safety procedures.`

const sampleText = `The state computed at a sample does not meet what the batch record will accept, or
an adjustment does not reach its pH with what may be added.

Concentrations are of everything dissolved of that ion or element, solids left
out. A pH read on a cooled sample is computed at that temperature.

Change the recipe, or the limit if it was never meant so.

It is wrong by the uncertainty of the constants and of the water analysis.`

const mildText = `In balance a solid would come down, but the oversaturation is so small that the
liquor may stay clear for hours or days: saturation index below 0.3 for sparingly
soluble solids, 0.03 for very soluble salts (common practice, no source). Crystals
already in the tank, dust or scratches end that.

The walk goes on as if the solid came down, to be on the safe side.

Hold it for a short time only, filter dust out, seed it on purpose, or move away
from the limit.

It is wrong when seeds are there that the recipe does not name.`

const coldText = `The tank's lines, or the tank when it idles, get colder than the liquor is made.

There a solid comes down that is not there at the temperature of the step.

Computed by cooling the liquor of the last step of each stage, and of transfers,
to the temperature given as coldest.

Heat or drain the line, dilute, or keep it short.

It is wrong when the liquor never stands long enough to get that cold.`

const airText = `An open tank takes up or loses carbon dioxide until the liquor is in balance with
the air (0.042 kPa of carbon dioxide). That takes hours; then a solid comes down
that is not there now.

Computed for the last step of each stage in tanks with a headspace of air. Less
than 0.3 g/L is a note: hard waters do this and leave a bloom.

Cover the tank, soften the water, or use the liquor the same day.

It is wrong when the tank is closed but the recipe does not say so.`

const unplannedText = `A solid is oversaturated and comes down that the recipe does not expect and that is
not the charge itself.

The amount is that at equilibrium. The saturation index is that of the liquor
before anything new came down, ± one standard uncertainty of the phase's constant
and of the activity model; the probability follows from the two. What limits the
amount are the ions of which most comes down.

Less than 5 mg/L is a note, less than 50 mg/L a caution. Solids that form slowly are left to SOL-05, slight
oversaturation to SAT-02.

Use two tanks, less of one charge, another pH, a complexing agent, softened water;
or say that it is planned: expect "phase" { }.

It is wrong when the solid forms so slowly that the batch is gone before, or when
something that holds the metal in solution is missing from the recipe.`

const plannedText = `A solid that the recipe expects does not form in its stage, or forms less than
at_least says.

A percentage is counted on what the scarcest of the solid's components allows.

What is left in solution is told with the pH and temperature, for that is what
holds the yield back.

Change the pH, the temperature or the dose; take away what complexes the metal.

It is wrong when another form of the solid comes first.`

const carriedText = `Solids stand in the tank that liquor is taken from, and go over with it. With
clear = true only clear liquor is taken; a filter or a decant keeps them back.

The amount follows from the volume taken of a well stirred tank.

Filter, decant, let it settle, or say that the solid is planned.

It is wrong when the solid has settled and the outlet is above it.`

const agedText = `A solid that forms slowly is oversaturated. It will not be there within the hour,
but it may be when the batch stands or is aged, and then the more soluble solid
that came first turns into it.

Computed with all phases allowed, after ageing and after holds of an hour or more.

Solids that need years (dolomite, quartz, haematite and the like) are left out.

Use the liquor fresh, filter before use, or age it on purpose.

It is wrong about when: rates are not computed.`

const hydrateText = `A salt changes its water of crystallisation or its form, in the tank or when it
gets as cold as its lines. A hydrate that takes up water can set the whole batch.

Computed with all hydrates in balance at the temperature and water activity.

Stay on one side of the transition.

It is wrong when the change is hindered, as that of gypsum to anhydrite is.`

const rangeText = `The liquor is stronger, hotter or colder than the activity model is made for. The
figures are carried on, with a larger uncertainty.

The model: extended Debye-Hückel with specific ion interaction, to 3 mol/kg. Salts
calibrated on handbook solubilities come out right alone at any strength; their
mixtures are less sure. Or a solid stands at a temperature for which its source
gives no constant: it is carried on with its enthalpy, or as it is.

Trust the direction more than the number, and try it in the laboratory.`

const missingText = `Something was left out or taken on trust: an ingredient without data, a material
taken as inert, a water without a temperature, a salt without solubility data.

Give a material block with contents, or a phase of the site's own with its source.

Organic solvents and redox are outside what is computed.`

const analysisText = `Cations and anions of a water analysis do not balance. 5 % of their sum is usual
(Standard Methods 1030 E, from memory); over 10 % the analysis is wrong or
something is missing. It was closed with sodium or chloride to go on.

Look for the missing ion: nitrate, sulfate, bicarbonate.

It is wrong when alkalinity was given in another unit.`

const oxidationText = `The liquor holds something that the air oxidises: iron(II), manganese(II), sulfite,
sulfide. Redox equilibria and rates are not computed, so solids of the oxidised
metal do not show in the findings.

A note where it goes slowly, a caution where it goes within hours.

Keep the air out, keep it acid, or use it fresh.`

const overfillText = `The content of a tank passes its capacity within the step, solids included.

Volumes come from the density of the liquor, not from adding litres.

It is right to about 1 % in dilute and 3 % in strong liquors.`

const lowText = `More is taken out than there is, or the tank is stirred, heated or dosed with less
in it than the stirrer needs.`

const ratingText = `The temperature after the step is outside what the tank is rated for. Heat of
solution is counted where the catalogue knows it, to infinite dilution; heat of
neutralisation is not, so a tank may get hotter than told.

Heat or cool less, dose more slowly, or use a tank that is rated for it.`
