//! Severinghaus. Simple, accurate equations for human blood O2 dissociation computations. J Appl Physiol
//! 1979;46:599, table 1: saturation in % at PO2 in mmHg, 37 °C, pH 7.40. Read off the table as printed.

use physiology::{oxygen_saturation, saturation_in_blood};

/// The author's own claim for his equation against his table is ±.55 points; the rows are rounded to .01.
const POINTS: f64 = 0.60;

#[rustfmt::skip]
const TABLE: &[(f64, f64)] = &[
    (1.0, 0.60), (2.0, 1.19), (4.0, 2.56), (6.0, 4.37), (8.0, 6.68), (10.0, 9.58), (12.0, 12.96), (14.0, 16.89),
    (16.0, 21.40), (18.0, 26.50), (20.0, 32.12), (22.0, 37.60), (24.0, 43.14), (26.0, 48.27), (28.0, 53.16),
    (30.0, 57.54), (32.0, 61.69), (34.0, 65.16), (36.0, 68.63), (38.0, 71.94), (40.0, 74.69), (42.0, 77.29),
    (44.0, 79.55), (46.0, 81.71), (48.0, 83.52), (50.0, 85.08), (52.0, 86.59), (54.0, 87.70), (56.0, 88.93),
    (58.0, 89.95), (60.0, 90.85), (65.0, 92.73), (70.0, 94.06), (75.0, 95.10), (80.0, 95.84), (85.0, 96.42),
    (90.0, 96.88), (95.0, 97.25), (100.0, 97.49), (110.0, 97.91), (120.0, 98.21), (130.0, 98.44), (140.0, 98.62),
    (150.0, 98.77), (175.0, 99.03), (200.0, 99.20), (225.0, 99.32), (250.0, 99.41), (300.0, 99.53), (400.0, 99.65),
    (500.0, 99.72),
];

#[test]
fn every_row_of_his_table() {
    let mut worst = (0.0_f64, 0.0);
    for &(po2, percent) in TABLE {
        let error = 100.0 * oxygen_saturation(po2) - percent;
        if error.abs() > worst.0.abs() {
            worst = (error, po2);
        }
        assert!(error.abs() < POINTS, "PO2 {po2}: off by {error:.2} points");
    }
    println!("{} rows, worst {:+.2} points at PO2 {}", TABLE.len(), worst.0, worst.1);
}

#[test]
fn acid_blood_holds_less() {
    // Bohr: at pH 7.20 the same PO2 stands for less saturation, at pH 7.40 for the same.
    assert!(saturation_in_blood(60.0, 7.20) < oxygen_saturation(60.0) - 0.02);
    assert!((saturation_in_blood(60.0, 7.40) - oxygen_saturation(60.0)).abs() < 1e-12);
}
