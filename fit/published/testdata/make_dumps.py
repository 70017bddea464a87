#!/usr/bin/env python3
"""Write ../dumps from source/: the published tables as dumps for the plain schema.

Values are moved between units as text, by shifting the decimal point, so that
no digit is gained or lost. Run in this folder; needs only Python 3.
"""
import csv
import pathlib

HERE = pathlib.Path(__file__).parent


def shift(text, places):
    """Move the decimal point of text by places to the right (left if negative)."""
    sign, digits = ("-", text[1:]) if text.startswith("-") else ("", text)
    whole, _, part = digits.partition(".")
    if places > 0:
        part = part.ljust(places, "0")
        whole, part = whole + part[:places], part[places:]
    elif places < 0:
        whole = whole.rjust(-places + 1, "0")
        whole, part = whole[:places], whole[places:] + part
    whole = whole.lstrip("0") or "0"
    return sign + whole + ("." + part if part else "")


MARTIN = ("J. Martin et al., Int. J. Adv. Res. Chem. Sci. 4(9) (2017), DOI 10.20431/2349-0403.0409002, "
          "read in a public copy that names the paper as its source")
COMPUTED = ("computed from limiting molar conductivities (CRC Handbook, Vanysek) without activity correction; "
            "not published")
UNIT = "conductivity from uS/cm to mS/cm by a decimal shift"

# name: (header, decimal shift of the reading, preamble)
TABLES = {
    "chloride-silver": ("volume_mL,mV", 3, [
        ("sample", "chloride 2.433 mmol"),
        ("titrant", "AgNO3"),
        ("titrant_mol_per_l", "0.1000"),
        ("reaction", "precipitation"),
        ("source", "Skoog, West, Holler, Crouch, Fundamentals of Analytical Chemistry, 8th ed. 2004, Table 21-1"),
        ("status", "FROM MEMORY"),
        ("conversion", "potential against the saturated calomel electrode from V to mV by a decimal shift"),
    ]),
    "weak-acid": ("volume_mL,pH", 0, [
        ("sample", "weak acid"),
        ("titrant", "NaOH"),
        ("titrant_mol_per_l", "0.100"),
        ("reaction", "acid-base"),
        ("source", "D. Harvey, Modern Analytical Chemistry, McGraw-Hill 2000, Table 9.5, p. 291"),
        ("status", "READ"),
    ]),
    "phosphoric": ("volume_mL,pH", 0, [
        ("sample", "H3PO4 0.04389 mol/L"),
        ("titrant", "NaOH"),
        ("titrant_mol_per_l", "0.09948"),
        ("reaction", "acid-base"),
        ("aliquot_ml", "25"),
        ("source", MARTIN),
        ("status", "READ"),
    ]),
    "seawater": ("volume_mL,pH", 0, [
        ("sample", "seawater 200 g"),
        ("titrant", "strong acid"),
        ("titrant_mol_per_l", "0.3000"),
        ("reaction", "acid-base"),
        ("aliquot_ml", "200"),
        ("density_g_per_ml", "1.0"),
        ("conversion", "the source gives acid and sample by mass and the acid in mol/kg; a density of 1.0 g/mL "
                       "is put for both, so that 1 g is 1 mL; pH is on the free scale"),
        ("source", "A. G. Dickson, Deep-Sea Research 28A (1981) 609-623, Table 1, read in a public copy"),
        ("status", "READ"),
    ]),
    "dilute-acid": ("volume_mL,pH", 0, [
        ("sample", "weak acid 1.02e-4 mol/L, pKa 8.16"),
        ("titrant", "NaOH"),
        ("titrant_mol_per_l", "0.001004"),
        ("reaction", "acid-base"),
        ("aliquot_ml", "49.94"),
        ("source", "L. M. Schwartz, J. Chem. Educ. 69 (1992) 879-883, simulated readings"),
        ("status", "FROM MEMORY"),
    ]),
    "conductance-strong": ("volume_mL,conductivity_mS_cm", -3, [
        ("sample", "HCl 0.01 mol/L"), ("titrant", "NaOH"), ("reaction", "acid-base")]),
    "conductance-weak": ("volume_mL,conductivity_mS_cm", -3, [
        ("sample", "acetic acid 0.01 mol/L"), ("titrant", "NaOH"), ("reaction", "acid-base")]),
    "conductance-mixture": ("volume_mL,conductivity_mS_cm", -3, [
        ("sample", "HCl 0.004 and acetic acid 0.008 mol/L"), ("titrant", "NaOH"), ("reaction", "acid-base")]),
    "conductance-silver": ("volume_mL,conductivity_mS_cm", -3, [
        ("sample", "KCl 0.01 mol/L"), ("titrant", "AgNO3"), ("reaction", "precipitation")]),
}
CONDUCTANCE = [("titrant_mol_per_l", "0.1"), ("aliquot_ml", "100"), ("temperature_c", "25"),
               ("source", COMPUTED), ("status", "COMPUTED"), ("conversion", UNIT)]


def write(name, header, places, preamble):
    if name.startswith("conductance"):
        preamble = preamble + CONDUCTANCE
    with open(HERE / "source" / f"{name}.csv", newline="") as f:
        rows = list(csv.reader(f))[1:]
    lines = [f"# {key}: {value}" for key, value in preamble] + [header]
    lines += [f"{volume},{shift(reading, places)}" for volume, reading in rows]
    (HERE.parent / "dumps" / f"{name}.csv").write_text("\n".join(lines) + "\n")


for table, row in TABLES.items():
    write(table, *row)
