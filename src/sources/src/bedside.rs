//! Limits and rules of the bedside. Each is a default that the local rule may replace.

use crate::figures;

const ARDSNET: &str = "ARDS Network. N Engl J Med 2000;342:1301";

figures! { BEDSIDE;
    RATE_MOST = 35.0, 0.0, "/min", "Greatest rate of lung-protective ventilation", ARDSNET, Opened;
    PLATEAU_MOST = 30.0, 0.0, "cmH2O", "Greatest plateau, held half a second", ARDSNET, Opened;
    PH_GOAL_HIGH = 7.45, 0.0, "1", "Upper end of the pH goal in lung injury", ARDSNET, Opened;
    PACO2_USUAL_HIGH = 45.0, 0.0, "mmHg", "Upper end of the usual PaCO2", "Physiology texts", CommonPractice;
    PH_USUAL_LOW = 7.35, 0.0, "1", "Lower end of the usual pH", "Physiology texts", CommonPractice;
    PACO2_USUAL_LOW = 35.0, 0.0, "mmHg", "Lower end of the usual PaCO2, and of that with raised pressure in the skull", "Brain Trauma Foundation, 4th ed. 2016", Quoted;
    SETTLED_AFTER = 30.0, 0.0, "min", "Minutes of unchanged settings after hand ventilation before a gas tells about them", "Assumed", Assumed;
    JUST_CHANGED = 5.0, 0.0, "min", "Minutes under which settings count as changed just before a gas", "Assumed", Assumed;
    SURPRISE = 3.0, 0.0, "1", "Standard deviations from which a first gas and its settings are asked about together", "Assumed", Assumed;
    RETAINER_SBE = 5.0, 0.0, "mmol/L", "Standard base excess from which chronic retention is asked about", "Assumed", Assumed;
    RETAINER_PACO2 = 50.0, 0.0, "mmHg", "PaCO2 above which chronic retention is asked about", "Assumed", Assumed;
    RETAINER_PH_USUAL_HIGH = 7.38, 0.0, "1", "Upper end of a chronic retainer's own pH", "BTS/ICS, Davidson et al. Thorax 2016;71 S2", Opened;
    VT_LUNG_MOST = 8.0, 0.0, "mL/kg", "Tidal volume that lung-protective ventilation starts from", ARDSNET, Opened;
    METABOLIC_SBE = -8.0, 0.0, "mmol/L", "Standard base excess under which his own compensation is looked for", "Assumed", Assumed;
    PH_BORNE = 7.15, 0.0, "1", "pH above which acidosis is usually well borne", "Common practice", CommonPractice;
    CALL_PH = 7.25, 0.0, "1", "pH under which to call for help", "Gathered from BTS guidance and ARDS Network's card", Computed;
    HCO3_CHECK = 0.10, 0.0, "1", "Difference of printed and computed HCO3 from which all three are asked about", "Assumed", Assumed;
    KPA_LIKELY_MOST = 20.0, 0.0, "1", "PaCO2 figure up to which mmHg and kPa are asked about", "Assumed", Assumed;
    VT_LOW_ML_KG = 3.0, 0.0, "mL/kg", "Tidal volume under which it is asked about", "Assumed", Assumed;
    VT_HIGH_ML_KG = 12.0, 0.0, "mL/kg", "Tidal volume over which it is asked about", "Assumed", Assumed;
    RATE_UNUSUAL = 40.0, 0.0, "/min", "Rate over which it is asked about", "Assumed", Assumed;
    SETTLED_WITHIN = 2.0, 0.0, "mmHg", "Distance from the settled value that counts as settled", "Assumed", Assumed;
    STILL_SO_AFTER = 30.0, 0.0, "min", "Minutes without an entry after which the tool asks whether nothing changed", "Assumed", Assumed;
    CLOCKS_APART = 2.0, 0.0, "min", "Minutes that an entry may lie ahead of the clock before the clock is doubted", "Assumed", Assumed;
    VALID_FOR = 60.0, 0.0, "min", "Minutes without an entry after which the number is taken away", "Assumed", Assumed;
    HORIZON = 240.0, 0.0, "min", "How far ahead a forecast may run", "Assumed", Assumed;
    CIRCULATION_STEADY_FOR = 20.0, 0.0, "min", "Minutes of steady circulation before a gas counts", "Assumed", Assumed;
    RATIO_STEP = 1.2, 0.0, "1", "Minute volume over today's in the answer under pressure support", "Assumed", Assumed;
    OFFER_STEP = 4.0, 0.0, "/min", "Step between the rates offered", "Assumed", Assumed;
}
