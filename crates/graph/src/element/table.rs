//! Symbols, names and constants of the 118 elements, written once.
//!
//! Names and symbols: IUPAC Periodic Table of the Elements, 4 May 2022.

use super::Element;

macro_rules! elements {
    ($($constant:ident = $number:literal, $symbol:literal, $name:literal;)*) => {
        impl Element {
            $(
                #[doc = concat!("The element ", $name, ", ", $symbol, ".")]
                pub const $constant: Element = Element($number);
            )*
        }

        /// By atomic number; entry 0 is the wildcard.
        pub(super) static SYMBOLS: [&str; 119] = ["*", $($symbol),*];

        /// By atomic number; entry 0 is the wildcard.
        pub(super) static NAMES: [&str; 119] = ["unknown", $($name),*];

        /// Every pair of a symbol and its number, for the table that reads symbols.
        pub(super) const SYMBOL_NUMBERS: [(&str, u8); 118] = [$(($symbol, $number)),*];
    };
}

elements! {
    HYDROGEN = 1, "H", "hydrogen";
    HELIUM = 2, "He", "helium";
    LITHIUM = 3, "Li", "lithium";
    BERYLLIUM = 4, "Be", "beryllium";
    BORON = 5, "B", "boron";
    CARBON = 6, "C", "carbon";
    NITROGEN = 7, "N", "nitrogen";
    OXYGEN = 8, "O", "oxygen";
    FLUORINE = 9, "F", "fluorine";
    NEON = 10, "Ne", "neon";
    SODIUM = 11, "Na", "sodium";
    MAGNESIUM = 12, "Mg", "magnesium";
    ALUMINIUM = 13, "Al", "aluminium";
    SILICON = 14, "Si", "silicon";
    PHOSPHORUS = 15, "P", "phosphorus";
    SULFUR = 16, "S", "sulfur";
    CHLORINE = 17, "Cl", "chlorine";
    ARGON = 18, "Ar", "argon";
    POTASSIUM = 19, "K", "potassium";
    CALCIUM = 20, "Ca", "calcium";
    SCANDIUM = 21, "Sc", "scandium";
    TITANIUM = 22, "Ti", "titanium";
    VANADIUM = 23, "V", "vanadium";
    CHROMIUM = 24, "Cr", "chromium";
    MANGANESE = 25, "Mn", "manganese";
    IRON = 26, "Fe", "iron";
    COBALT = 27, "Co", "cobalt";
    NICKEL = 28, "Ni", "nickel";
    COPPER = 29, "Cu", "copper";
    ZINC = 30, "Zn", "zinc";
    GALLIUM = 31, "Ga", "gallium";
    GERMANIUM = 32, "Ge", "germanium";
    ARSENIC = 33, "As", "arsenic";
    SELENIUM = 34, "Se", "selenium";
    BROMINE = 35, "Br", "bromine";
    KRYPTON = 36, "Kr", "krypton";
    RUBIDIUM = 37, "Rb", "rubidium";
    STRONTIUM = 38, "Sr", "strontium";
    YTTRIUM = 39, "Y", "yttrium";
    ZIRCONIUM = 40, "Zr", "zirconium";
    NIOBIUM = 41, "Nb", "niobium";
    MOLYBDENUM = 42, "Mo", "molybdenum";
    TECHNETIUM = 43, "Tc", "technetium";
    RUTHENIUM = 44, "Ru", "ruthenium";
    RHODIUM = 45, "Rh", "rhodium";
    PALLADIUM = 46, "Pd", "palladium";
    SILVER = 47, "Ag", "silver";
    CADMIUM = 48, "Cd", "cadmium";
    INDIUM = 49, "In", "indium";
    TIN = 50, "Sn", "tin";
    ANTIMONY = 51, "Sb", "antimony";
    TELLURIUM = 52, "Te", "tellurium";
    IODINE = 53, "I", "iodine";
    XENON = 54, "Xe", "xenon";
    CAESIUM = 55, "Cs", "caesium";
    BARIUM = 56, "Ba", "barium";
    LANTHANUM = 57, "La", "lanthanum";
    CERIUM = 58, "Ce", "cerium";
    PRASEODYMIUM = 59, "Pr", "praseodymium";
    NEODYMIUM = 60, "Nd", "neodymium";
    PROMETHIUM = 61, "Pm", "promethium";
    SAMARIUM = 62, "Sm", "samarium";
    EUROPIUM = 63, "Eu", "europium";
    GADOLINIUM = 64, "Gd", "gadolinium";
    TERBIUM = 65, "Tb", "terbium";
    DYSPROSIUM = 66, "Dy", "dysprosium";
    HOLMIUM = 67, "Ho", "holmium";
    ERBIUM = 68, "Er", "erbium";
    THULIUM = 69, "Tm", "thulium";
    YTTERBIUM = 70, "Yb", "ytterbium";
    LUTETIUM = 71, "Lu", "lutetium";
    HAFNIUM = 72, "Hf", "hafnium";
    TANTALUM = 73, "Ta", "tantalum";
    TUNGSTEN = 74, "W", "tungsten";
    RHENIUM = 75, "Re", "rhenium";
    OSMIUM = 76, "Os", "osmium";
    IRIDIUM = 77, "Ir", "iridium";
    PLATINUM = 78, "Pt", "platinum";
    GOLD = 79, "Au", "gold";
    MERCURY = 80, "Hg", "mercury";
    THALLIUM = 81, "Tl", "thallium";
    LEAD = 82, "Pb", "lead";
    BISMUTH = 83, "Bi", "bismuth";
    POLONIUM = 84, "Po", "polonium";
    ASTATINE = 85, "At", "astatine";
    RADON = 86, "Rn", "radon";
    FRANCIUM = 87, "Fr", "francium";
    RADIUM = 88, "Ra", "radium";
    ACTINIUM = 89, "Ac", "actinium";
    THORIUM = 90, "Th", "thorium";
    PROTACTINIUM = 91, "Pa", "protactinium";
    URANIUM = 92, "U", "uranium";
    NEPTUNIUM = 93, "Np", "neptunium";
    PLUTONIUM = 94, "Pu", "plutonium";
    AMERICIUM = 95, "Am", "americium";
    CURIUM = 96, "Cm", "curium";
    BERKELIUM = 97, "Bk", "berkelium";
    CALIFORNIUM = 98, "Cf", "californium";
    EINSTEINIUM = 99, "Es", "einsteinium";
    FERMIUM = 100, "Fm", "fermium";
    MENDELEVIUM = 101, "Md", "mendelevium";
    NOBELIUM = 102, "No", "nobelium";
    LAWRENCIUM = 103, "Lr", "lawrencium";
    RUTHERFORDIUM = 104, "Rf", "rutherfordium";
    DUBNIUM = 105, "Db", "dubnium";
    SEABORGIUM = 106, "Sg", "seaborgium";
    BOHRIUM = 107, "Bh", "bohrium";
    HASSIUM = 108, "Hs", "hassium";
    MEITNERIUM = 109, "Mt", "meitnerium";
    DARMSTADTIUM = 110, "Ds", "darmstadtium";
    ROENTGENIUM = 111, "Rg", "roentgenium";
    COPERNICIUM = 112, "Cn", "copernicium";
    NIHONIUM = 113, "Nh", "nihonium";
    FLEROVIUM = 114, "Fl", "flerovium";
    MOSCOVIUM = 115, "Mc", "moscovium";
    LIVERMORIUM = 116, "Lv", "livermorium";
    TENNESSINE = 117, "Ts", "tennessine";
    OGANESSON = 118, "Og", "oganesson";
}
