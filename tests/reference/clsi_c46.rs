//! NCCLS/CLSI C46-A (2001; A2 2009): HCO3 and standard base excess, and the acute line that follows when the
//! standard base excess is held from 7.40/40 (computed from the set before this program).

use physiology::{hco3_mmol_l, ph_at, standard_base_excess};

/// The rows carry three decimals of pH.
const PH: f64 = 0.0006;

#[test]
fn the_acute_line() {
    let be = standard_base_excess(7.40, 40.0);
    for (pco2, ph) in [(60.0, 7.262), (80.0, 7.163), (100.0, 7.085), (120.0, 7.021)] {
        println!("PaCO2 {pco2}: pH {:.4} ({ph})", ph_at(pco2, be));
        assert!((ph_at(pco2, be) - ph).abs() < PH);
    }
}

#[test]
fn published_teaching_gases_agree_with_the_set() {
    // Teaching cases of university and college pages; pH/PaCO2/HCO3, printed with other constants and rounding:
    // HCO3 within 1.5 mmol/L or 7 %.
    for (ph, pco2, hco3) in [(7.21, 70.0, 27.0), (7.25, 60.0, 26.0), (7.56, 31.0, 27.0), (7.54, 25.0, 22.0)] {
        let ours = hco3_mmol_l(ph, pco2);
        println!("{ph}/{pco2}: HCO3 {ours:.2} ({hco3})");
        assert!((ours - hco3).abs() < f64::max(1.5, 0.07 * hco3));
    }
}

#[test]
fn the_textbook_form() {
    // The textbook form [H+] = 24·PCO2/HCO3 (nmol/L) uses other constants: within 3 % of the set at 7.40/40.
    let hydrogen = 24.0 * 40.0 / hco3_mmol_l(7.40, 40.0);
    assert!((hydrogen - 40.0).abs() / 40.0 < 0.03, "{hydrogen}");
}
