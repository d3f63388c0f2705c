//! Standard atomic weights. Written by `fixtures/elements/generate.py`; do not edit.
//!
//! Weights: CIAAW 2021, abridged values (Prohaska et al., Pure Appl. Chem. 2022, 94, 573), as
//! carried by the Python package periodictable 2.1.0. Elements without one: the nuclide with the
//! longest measured ground-state half-life in NUBASE2020 (Kondev et al., Chin. Phys. C 2021, 45,
//! 030001).

use super::Weight::{self, LongestLived, Standard, Unknown};

/// By atomic number; entry 0 is the wildcard.
#[rustfmt::skip]
pub(super) static WEIGHTS: [Weight; 119] = [
    Unknown,
    Standard(1.008), // H
    Standard(4.002602), // He
    Standard(6.94), // Li
    Standard(9.0121831), // Be
    Standard(10.81), // B
    Standard(12.011), // C
    Standard(14.007), // N
    Standard(15.999), // O
    Standard(18.998403162), // F
    Standard(20.1797), // Ne
    Standard(22.98976928), // Na
    Standard(24.305), // Mg
    Standard(26.9815384), // Al
    Standard(28.085), // Si
    Standard(30.973761998), // P
    Standard(32.06), // S
    Standard(35.45), // Cl
    Standard(39.95), // Ar
    Standard(39.0983), // K
    Standard(40.078), // Ca
    Standard(44.955907), // Sc
    Standard(47.867), // Ti
    Standard(50.9415), // V
    Standard(51.9961), // Cr
    Standard(54.938043), // Mn
    Standard(55.845), // Fe
    Standard(58.933194), // Co
    Standard(58.6934), // Ni
    Standard(63.546), // Cu
    Standard(65.38), // Zn
    Standard(69.723), // Ga
    Standard(72.63), // Ge
    Standard(74.921595), // As
    Standard(78.971), // Se
    Standard(79.904), // Br
    Standard(83.798), // Kr
    Standard(85.4678), // Rb
    Standard(87.62), // Sr
    Standard(88.905838), // Y
    Standard(91.224), // Zr
    Standard(92.90637), // Nb
    Standard(95.95), // Mo
    LongestLived(97), // Tc
    Standard(101.07), // Ru
    Standard(102.90549), // Rh
    Standard(106.42), // Pd
    Standard(107.8682), // Ag
    Standard(112.414), // Cd
    Standard(114.818), // In
    Standard(118.71), // Sn
    Standard(121.76), // Sb
    Standard(127.6), // Te
    Standard(126.90447), // I
    Standard(131.293), // Xe
    Standard(132.90545196), // Cs
    Standard(137.327), // Ba
    Standard(138.90547), // La
    Standard(140.116), // Ce
    Standard(140.90766), // Pr
    Standard(144.242), // Nd
    LongestLived(145), // Pm
    Standard(150.36), // Sm
    Standard(151.964), // Eu
    Standard(157.25), // Gd
    Standard(158.925354), // Tb
    Standard(162.5), // Dy
    Standard(164.930329), // Ho
    Standard(167.259), // Er
    Standard(168.934219), // Tm
    Standard(173.045), // Yb
    Standard(174.9668), // Lu
    Standard(178.486), // Hf
    Standard(180.94788), // Ta
    Standard(183.84), // W
    Standard(186.207), // Re
    Standard(190.23), // Os
    Standard(192.217), // Ir
    Standard(195.084), // Pt
    Standard(196.96657), // Au
    Standard(200.592), // Hg
    Standard(204.38), // Tl
    Standard(207.2), // Pb
    Standard(208.9804), // Bi
    LongestLived(209), // Po
    LongestLived(210), // At
    LongestLived(222), // Rn
    LongestLived(223), // Fr
    LongestLived(226), // Ra
    LongestLived(227), // Ac
    Standard(232.0377), // Th
    Standard(231.03588), // Pa
    Standard(238.02891), // U
    LongestLived(237), // Np
    LongestLived(244), // Pu
    LongestLived(243), // Am
    LongestLived(247), // Cm
    LongestLived(247), // Bk
    LongestLived(251), // Cf
    LongestLived(252), // Es
    LongestLived(257), // Fm
    LongestLived(258), // Md
    LongestLived(259), // No
    LongestLived(266), // Lr
    LongestLived(267), // Rf
    LongestLived(268), // Db
    LongestLived(269), // Sg
    LongestLived(270), // Bh
    LongestLived(269), // Hs
    LongestLived(277), // Mt
    LongestLived(282), // Ds
    LongestLived(282), // Rg
    LongestLived(286), // Cn
    LongestLived(286), // Nh
    LongestLived(290), // Fl
    LongestLived(290), // Mc
    LongestLived(293), // Lv
    LongestLived(294), // Ts
    LongestLived(295), // Og
];
