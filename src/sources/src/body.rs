//! The body's pools and flows, before scaling to the patient.

use crate::figures;

const ALBANESE: &str = "Albanese et al. Am J Physiol Heart 2016;310:H899";

figures! { BODY;
    GAS_CONSTANT_FACTOR = 862.93, 0.0, "mmHg", "mL STPD in a mL BTPS, times mmHg: 760·310.15/273.15", "Derivation from the standard conditions", Computed;
    BODY_REFERENCE = 70.0, 0.0, "kg", "Weight that the published volumes belong to", ALBANESE, Quoted;
    FAST_TISSUE = 4.5, 0.0, "L", "Brain, heart, gut, liver, kidney", ALBANESE, Quoted;
    SLOW_TISSUE = 31.2, 0.0, "L", "Muscle and the rest", ALBANESE, Quoted;
    VENOUS_BLOOD = 2.8, 0.0, "L", "Venous blood, shared by the pools as their flow is", "Physiology texts", Memory;
    LUNG_TISSUE = 0.55, 0.0, "mL/mmHg", "CO2 held by lung tissue", "DuBois. J Appl Physiol 1952;5:1 (.45 mL per kg of lung)", Computed;
    EXCESS_WEIGHT_SHARE = 0.25, 0.0, "1", "Share of the weight above the predicted one that counts as tissue", "Assumed", Assumed;
    TISSUE_SLOPE_AT = 40.0, 0.0, "mmHg", "Pressure at which the tissue slope is given; it falls as the square root", "Computed from man's apnoea, washout and half-times", Computed;
    CARDIAC_OUTPUT_POWER = 0.75, 0.0, "1", "Power of weight in cardiac output", "Assumed: allometric", Assumed;
    PBW_MALE = 50.0, 0.0, "kg", "Predicted body weight of a man at the reference height", "ARDS Network. N Engl J Med 2000;342:1301", Opened;
    PBW_FEMALE = 45.5, 0.0, "kg", "Predicted body weight of a woman at the reference height", "ARDS Network. N Engl J Med 2000;342:1301", Opened;
    PBW_PER_CM = 0.91, 0.0, "kg/cm", "Predicted body weight per cm of height", "ARDS Network. N Engl J Med 2000;342:1301", Opened;
    PBW_REFERENCE_CM = 152.4, 0.0, "cm", "Reference height of the predicted body weight", "ARDS Network. N Engl J Med 2000;342:1301", Opened;
    PBW_LEAST = 25.0, 0.0, "kg", "Predicted body weight under which the adult formula has left its range", "Assumed", Assumed;
    SERIES_CHILD = 3.28, 0.0, "mL/kg", "Anatomical dead space of a child, at birth", "Numa, Newth. J Appl Physiol 1996;80:1485", Opened;
    SERIES_CHILD_AGE = 0.56, 0.0, "mL/kg", "Its fall with ln(1 + age)", "Numa, Newth. J Appl Physiol 1996;80:1485", Opened;
    ADULT_FROM = 18.0, 0.0, "years", "Age from which the adult formulas are used", "Assumed", Assumed;
    PRESSURE_LEAST = 4.0, 0.0, "mmHg", "Least PCO2 the chemistry is tabled for", "Assumed", Assumed;
    PRESSURE_MOST = 196.0, 0.0, "mmHg", "Greatest PCO2 the chemistry is tabled for", "Assumed", Assumed;
}
