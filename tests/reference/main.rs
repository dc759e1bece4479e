//! Published tables and worked points, one file a source. Above each row stands how to reproduce it; every
//! tolerance is named with its reason.

mod ards_network_2000;
mod clsi_c46;
mod douglas_1988;
mod mifflin_1990;
mod severinghaus_1979;
