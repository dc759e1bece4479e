//! CO2 production.

use crate::figures;

const MIFFLIN: &str = "Mifflin et al. Am J Clin Nutr 1990;51:241";
const TERAO: &str = "Terao et al. Crit Care Med 2003;31:830";
const SMALLWOOD: &str = "Smallwood et al. Respir Care 2015;60:718";

figures! { PRODUCTION;
    MIFFLIN_KG = 10.0, 0.0, "kcal/d/kg", "Resting energy per kg", MIFFLIN, Opened;
    MIFFLIN_CM = 6.25, 0.0, "kcal/d/cm", "Resting energy per cm", MIFFLIN, Opened;
    MIFFLIN_YEAR = 5.0, 0.0, "kcal/d/year", "Resting energy lost per year", MIFFLIN, Opened;
    MIFFLIN_MALE = 5.0, 0.0, "kcal/d", "Resting energy: constant for men", MIFFLIN, Opened;
    MIFFLIN_FEMALE = -161.0, 0.0, "kcal/d", "Resting energy: constant for women", MIFFLIN, Opened;
    ENERGY_LIGHT = 1.29, 0.0, "1", "Energy over resting, light sedation (and none, for want of a figure)", TERAO, Opened;
    ENERGY_MODERATE = 1.20, 0.0, "1", "Energy over resting, moderate sedation or not known", TERAO, Opened;
    ENERGY_HEAVY = 1.13, 0.0, "1", "Energy over resting, heavy sedation", TERAO, Opened;
    VCO2_PER_KCAL = 0.1175, 0.0, "mL/min per kcal/d", "CO2 of a kcal at a respiratory quotient of .82", "Weir. J Physiol 1949;109:1", Computed;
    FEVER_FACTOR = 1.085, 0.0, "per °C", "CO2 production per degree above 37 °C", "Manthous et al. Am J Respir Crit Care Med 1995;151:10", Opened;
    COOLING_FACTOR = 1.07, 0.0, "per °C", "CO2 production per degree below 37 °C, not shivering", "Crit Care 2002 (cc1899), 12 ventilated patients", Opened;
    VCO2_ADULT = 0.20, 0.20, "ln", "Spread of CO2 production among adults of one size", "Hoka et al. Anaesthesia 1992;47:65 (174±38)", Computed;
    VCO2_CHILD = 0.25, 0.25, "ln", "Spread of CO2 production among children", "Assumed", Assumed;
    SMALLWOOD_INFANT = 7.6, 0.0, "mL/kg/min", "CO2 production of a ventilated child under half a year", SMALLWOOD, Opened;
    SMALLWOOD_CHILD = 5.8, 0.0, "mL/kg/min", "CO2 production of a ventilated child of half a year to 8", SMALLWOOD, Opened;
    SMALLWOOD_OLDER = 3.5, 0.0, "mL/kg/min", "CO2 production of a ventilated child over 8", SMALLWOOD, Opened;
    SMALLWOOD_INFANT_UNDER = 0.5, 0.0, "years", "Age that ends the first of these groups", SMALLWOOD, Opened;
    SMALLWOOD_OLDER_FROM = 8.0, 0.0, "years", "Age that begins the last of these groups", SMALLWOOD, Opened;
    NORMAL_TEMPERATURE = 37.0, 0.0, "°C", "Temperature that production, gases and the gas factor refer to", "Convention", CommonPractice;
}
