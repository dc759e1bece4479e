//! What every body starts from before a gas: the mean and spread of each parameter.

use crate::figures;

figures! { PRIORS;
    SIZE_UNKNOWN = 75.0, 0.25, "kg (spread of ln)", "Weight of an adult of unknown size", "Assumed", Assumed;
    AGE_UNKNOWN = 60.0, 0.07, "years (spread of ln production)", "Age when not known, and what that adds to production's spread", "Assumed", Assumed;
    SEX_UNKNOWN = 0.5, 0.07, "1 (spread of ln production)", "Sex when not known: between the two formulas", "Assumed", Assumed;
    HEIGHT_UNKNOWN = 168.0, 0.12, "cm (spread of ln size)", "Height of an adult when only the weight is known", "Assumed", Assumed;
    WEIGHT_UNKNOWN = 1.0, 0.12, "1 (spread of ln production)", "Weight over predicted weight when only the height is known", "Assumed", Assumed;
    HEIGHT_GUESSED = 0.0, 0.06, "ln", "Spread that a height by eye adds to the size", "Assumed", Assumed;
    CHILD_BODY_MASS_INDEX = 16.0, 0.0, "kg/m²", "Body-mass index of a child whose weight is not known", "Assumed: the middle of childhood", Assumed;
    CHILD_KG_PER_YEAR = 2.0, 0.0, "kg/year", "Weight of a child of unknown size, per year of age", "Common practice: 2·(age + 4)", CommonPractice;
    CHILD_YEARS_AHEAD = 4.0, 0.0, "years", "Years added to the age in that rule", "Common practice: 2·(age + 4)", CommonPractice;
    LEAST_ALVEOLAR_SHARE = 0.02, 0.0, "1", "Least share of a breath taken to reach the alveoli (streaming, diffusion)", "Assumed", Assumed;
    SERIES_TUBE = 1.1, 0.30, "mL/kg (spread of ln)", "Series dead space with a tube in place", "Nunn, Campbell 1959: intubation about halves it", Memory;
    SERIES_NO_TUBE = 2.2, 0.30, "mL/kg (spread of ln)", "Series dead space without a tube", "Radford 1955", Opened;
    SERIES_TUBE_CHILD = 3.0, 0.23, "mL/kg (spread of ln)", "Series dead space of a small child, tube and circuit", "Korean J Anesthesiol 2021;74(3)", Opened;
    APPARATUS = 60.0, 23.0, "mL", "Exchanger and mount of an adult when not typed (30 to 90)", "Common practice", CommonPractice;
    ALVEOLAR_SHARE = 0.25, 0.12, "1", "Share of what passes the series dead space that exchanges nothing", "Assumed; towards Nuckton 2002 in illness", Assumed;
    VDVT_LUNG_INJURY = 0.58, 0.09, "1", "Dead space over tidal volume in early lung injury", "Nuckton et al. N Engl J Med 2002;346:1281", Opened;
    CARDIAC_OUTPUT = 5.0, 0.25, "L/min at 70 kg (spread of ln)", "Cardiac output", "Physiology texts", Memory;
    TISSUE_SLOPE = 1.6, 0.35, "mL/L/mmHg (spread of ln)", "CO2 that a litre of tissue takes up per mmHg, at 40 mmHg", "Computed from man's apnoea, washout and half-times", Computed;
    LUNG_BLOOD = 1.5, 0.20, "L at 70 kg (spread of ln)", "Blood at the lung's PCO2: arterial, pulmonary, in transit", "Computed from the first minutes of apnoea", Computed;
    FLOW_FAST = 0.70, 0.3, "1 (spread on the logit)", "Share of flow through the fast tissue", "Albanese et al. Am J Physiol Heart 2016;310:H899", Quoted;
    PRODUCTION_FAST = 0.79, 0.3, "1 (spread on the logit)", "Share of production in the fast tissue", "Albanese et al. Am J Physiol Heart 2016;310:H899", Quoted;
    FRC = 25.0, 0.25, "mL/kg (spread of ln)", "Functional residual capacity, lying and ventilated", "Nunn, Applied Respiratory Physiology; assumed for the ventilated", Memory;
    FRC_INFANT = 17.0, 0.25, "mL/kg (spread of ln)", "Functional residual capacity under one year, anaesthetised", "Thorsteinsson et al. Anesthesiology 1990;73:876", Opened;
    HB_UNKNOWN = 12.0, 2.0, "g/dL", "Haemoglobin when not known", "Assumed", Assumed;
    SAO2_UNKNOWN = 0.95, 0.0, "1", "Arterial saturation when not known", "Assumed", Assumed;
    RQ = 0.82, 0.05, "1", "Respiratory quotient", "Physiology texts", Memory;
    ANALYSER_PACO2 = 0.03, 0.03, "ln", "Error of a PaCO2: sample and analyser together", "Assumed: set to the analyser's own when known", Assumed;
    ANALYSER_PH = 0.01, 0.01, "1", "Error of a pH: sample and analyser together", "Assumed: set to the analyser's own when known", Assumed;
    JUMP = 0.08, 0.08, "ln", "Change of VCO2/(1 − VD/VT) that comes with a real change of settings", "Computed for a change of alveolar ventilation by 1.4 or more, less for less", Computed;
    JUMP_FULL_AT = 1.4, 0.0, "1", "Ratio of alveolar ventilations from which the whole jump is expected", "Computed", Computed;
    START_OFFSET = 0.10, 0.10, "ln", "How far the start may be from settled", "Assumed", Assumed;
    START_OFFSET_CHANGED = 0.20, 0.20, "ln", "How far the start may be from settled when settings were changed just before", "Assumed", Assumed;
    MEASURED_VCO2 = 0.10, 0.10, "ln", "Error of a measured CO2 production", "Assumed", Assumed;
    MEASURED_VDVT = 0.05, 0.05, "1", "Error of a measured VD/VT", "Assumed", Assumed;
    MEASURED_CARDIAC_OUTPUT = 0.15, 0.15, "ln", "Error of a measured cardiac output", "Assumed", Assumed;
    MEASURED_FRC = 0.10, 0.10, "ln", "Error of a measured FRC", "Assumed", Assumed;
    PROPOSAL_SPREAD = 1.06, 0.0, "1", "How much wider the members are first drawn than the Gaussian at the mode", "Computed on simulated patients: with 12 to 25 coordinates 1.15 halves the effective members", Computed;
    MEMBERS_LEAST = 64.0, 0.0, "1", "Effective members under which a forecast is withheld", "Computed on simulated patients", Computed;
}
