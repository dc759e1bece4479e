//! Acid–base, CO2 content and oxygen saturation.

use crate::figures;

const CLSI: &str = "NCCLS/CLSI C46-A, 2001 (C46-A2, 2009)";
const DOUGLAS: &str = "Douglas, Jones, Reed. J Appl Physiol 1988;65:473";
const KELMAN: &str = "Kelman. Respir Physiol 1967;3:111";
const SEVERINGHAUS: &str = "Severinghaus. J Appl Physiol 1979;46:599";

figures! { ACID_BASE;
    CO2_SOLUBILITY = 0.0307, 0.0, "mmol/L/mmHg", "CO2 dissolved in plasma at 37 °C", CLSI, Quoted;
    PK_CLSI = 6.105, 0.0, "1", "Apparent pK of carbonic acid at 37 °C", CLSI, Quoted;
    HCO3_REFERENCE = 24.8, 0.0, "mmol/L", "HCO3 at the reference point of the base excess", CLSI, Quoted;
    PH_REFERENCE = 7.40, 0.0, "1", "pH at the reference point of the base excess", CLSI, Quoted;
    BUFFER_EXTRACELLULAR = 16.2, 0.0, "mmol/L", "Buffering of the extracellular fluid, per pH unit", CLSI, Quoted;
    BE_BLOOD_HB_FACTOR = 0.014, 0.0, "dL/g", "Share of the red cells in the blood's base excess, per haemoglobin", CLSI, Quoted;
    BUFFER_HAEMOGLOBIN = 1.43, 0.0, "mmol/L per g/dL", "Buffering of haemoglobin, per pH unit", CLSI, Quoted;
    BUFFER_PLASMA = 7.7, 0.0, "mmol/L", "Buffering of plasma, per pH unit", CLSI, Quoted;
    BE_OXYGENATION = 0.2, 0.0, "mmol/L per g/dL", "Base excess gained by haemoglobin as it gives up its oxygen", "Lang, Zander. Clin Chem Lab Med 2002;40:404", Opened;
    DOUGLAS_MOLAR = 2.226, 0.0, "mL/dL per mmol/L", "CO2 volume of one mmol", DOUGLAS, Opened;
    DOUGLAS_HB = 0.0289, 0.0, "dL/g", "Blood-to-plasma ratio: haemoglobin", DOUGLAS, Opened;
    DOUGLAS_OXY = 3.352, 0.0, "1", "Blood-to-plasma ratio: constant of the saturation term", DOUGLAS, Opened;
    DOUGLAS_OXY_SLOPE = 0.456, 0.0, "1", "Blood-to-plasma ratio: saturation", DOUGLAS, Opened;
    DOUGLAS_PH = 8.142, 0.0, "1", "Blood-to-plasma ratio: pole of the pH term", DOUGLAS, Opened;
    DOUGLAS_PH_LEAST = 6.7, 0.0, "1", "Least pH at which the blood-to-plasma ratio is used; below it the ratio goes on along its relative slope", "Computed from Douglas 1988: its slope runs away outside", Computed;
    DOUGLAS_PH_MOST = 7.7, 0.0, "1", "Greatest pH at which the blood-to-plasma ratio is used; above it the ratio goes on along its relative slope", "Computed from Douglas 1988: its slope runs away outside", Computed;
    KELMAN_PK = 6.086, 0.0, "1", "pK' at 38 °C and pH 7.4", KELMAN, Quoted;
    KELMAN_PK_PH = 0.042, 0.0, "1", "pK' per pH unit", KELMAN, Quoted;
    KELMAN_PK_T = 0.00472, 0.0, "1/°C", "pK' per degree under 38 °C", KELMAN, Quoted;
    KELMAN_PK_T_PH = 0.00139, 0.0, "1/°C", "pK' per degree and pH unit", KELMAN, Quoted;
    SEVERINGHAUS_A = 23_400.0, 0.0, "mmHg³", "Oxygen saturation: numerator", SEVERINGHAUS, Opened;
    SEVERINGHAUS_B = 150.0, 0.0, "mmHg²", "Oxygen saturation: linear term", SEVERINGHAUS, Opened;
    BOHR = -0.48, 0.0, "1", "log of oxygen pressure at one saturation, per pH unit", "Okada 1977; Kelman 1966, quoted", Quoted;
    O2_PER_HB = 1.34, 0.0, "mL/g", "Oxygen bound by a gram of haemoglobin (texts give 1.34 to 1.39)", "Physiology texts", Opened;
}
