"""
Printed attenuation tables, each with its source, as the tests of the loss law and of the catalogue use them.

GUIDE: training guide for two-way-radio systems, appendix H, p. 65, nominal attenuation in dB/100 ft; read in a stored
extract. Its metric column has 35.5 dB/100 m for RG-58C/U at 450 MHz beside 11.75 dB/100 ft: see the tests.
JIS: table of JIS C 3501 solid-polyethylene cables, and of foam types, of a national amateur-radio society, in dB/10 m;
read in a stored extract.
JCS: specification sheet of 1999 for drop cables after JCS 5423, standard attenuation at 20 C in dB/km; read in a stored
extract. A page on JCS 5423:2017 prints the maxima, 1.15 times as much (JCS_MAXIMUM); read in a stored extract.
HANDBOOK: copper-clad-steel types, dB/100 ft; from memory, unverified. They serve as inputs only.

Velocity factors: JIS printed; solid polyethylene 0.66, PTFE 0.695 and foam 0.80 from memory (handbooks). Another 3 %
of velocity changes no residual of a fit by more than 0.02 %.
"""

GUIDE_MHZ = (50, 150, 450, 850)
GUIDE_DB_PER_100FT = {
    "RG-58C/U": (3.30, 6.10, 11.75, 17.75),
    "RG-213/U": (1.50, 2.70, 4.97, 7.53),
    "RG-303/U": (2.70, 4.60, 8.42, 11.3),
    "RG-393/U": (1.40, 2.60, 4.75, 6.50),
    "RG-8 foam": (1.20, 2.20, 3.98, 5.20),
    "RG-188A/U": (7.90, 13.3, 20.83, 26.66),
}
GUIDE_VELOCITY = {
    "RG-58C/U": 0.66,
    "RG-213/U": 0.66,
    "RG-303/U": 0.695,
    "RG-393/U": 0.695,
    "RG-8 foam": 0.80,
    "RG-188A/U": 0.695,
}

JIS_MHZ = (30, 50, 145, 430, 900, 1200, 1300, 2300)
JIS_DB_PER_10M = {
    "3D-2V": (0.77, 0.99, 1.71, 2.99, 4.47, 5.20, 5.43),
    "5D-2V": (0.44, 0.60, 1.05, 1.85, 3.0, 3.5, 3.7, 5.3),
    "8D-2V": (0.30, 0.40, 0.72, 1.35, 2.15, 2.6, 2.7, 3.9),
    "10D-2V": (0.22, 0.31, 0.56, 1.05, 1.7, 2.1, 2.15, 3.2),
    "5D-FB": (0.33, 0.43, 0.74, 1.31, 2.0, 2.3, 2.4, 3.35),
    "8D-FB": (0.22, 0.28, 0.49, 0.89, 1.3, 1.6, 1.65, 2.35),
    "10D-FB": (0.17, 0.22, 0.39, 0.72, 1.1, 1.3, 1.4, 1.95),
}
JIS_VELOCITY = {
    "3D-2V": 0.67, "5D-2V": 0.67, "8D-2V": 0.67, "10D-2V": 0.67, "5D-FB": 0.80, "8D-FB": 0.80, "10D-FB": 0.79,
}

JCS_MHZ = (90, 220, 470, 770, 1300, 1550, 1770, 2000, 2150, 2602)
JCS_DB_PER_KM = {
    "S-4C-FB": (76.0, 121, 182, 239, 320, 354, 382, 410, 427, 478),
    "S-5C-FB": (58.8, 95.0, 145, 192, 261, 291, 315, 340, 355, 400),
    "S-7C-FB": (41.7, 68.0, 105, 140, 193, 215, 234, 253, 265, 300),
}
JCS_VELOCITY = 0.80
JCS_MAXIMUM_MHZ = (90, 220, 470)
JCS_MAXIMUM_DB_PER_KM = {
    "S-4C-FB": ("87.4", "139", "209"),
    "S-5C-FB": ("67.6", "109", "167"),
    "S-7C-FB": ("48.0", "78.2", "121"),
}

HANDBOOK_MHZ = (1, 10, 50, 100, 200, 400, 700, 900, 1000)
HANDBOOK_DB_PER_100FT = {
    "RG-174A/U": (1.9, 3.3, 5.8, 8.4, 12.5, 19.0, 27.0, 31.0, 34.0),
    "RG-59B/U": (0.6, 1.1, 2.4, 3.4, 4.9, 7.0, 9.7, 11.1, 12.0),
    "RG-6 foam": (0.3, 0.7, 1.5, 2.0, 2.8, 4.0, 5.4, 6.2, 6.6),
}
HANDBOOK_VELOCITY = {"RG-174A/U": 0.66, "RG-59B/U": 0.66, "RG-6 foam": 0.82}

FEET_PER_100M = 1.0 / 0.3048


def points(cable):
    """Frequencies [Hz], printed losses [dB/100 m] and velocity factor of a cable."""
    if cable in GUIDE_DB_PER_100FT:
        return _hz(GUIDE_MHZ), [y * FEET_PER_100M for y in GUIDE_DB_PER_100FT[cable]], GUIDE_VELOCITY[cable]
    if cable in JIS_DB_PER_10M:
        losses = JIS_DB_PER_10M[cable]
        return _hz(JIS_MHZ[: len(losses)]), [10.0 * y for y in losses], JIS_VELOCITY[cable]
    if cable in JCS_DB_PER_KM:
        return _hz(JCS_MHZ), [y / 10.0 for y in JCS_DB_PER_KM[cable]], JCS_VELOCITY
    losses = HANDBOOK_DB_PER_100FT[cable]
    return _hz(HANDBOOK_MHZ), [y * FEET_PER_100M for y in losses], HANDBOOK_VELOCITY[cable]


def _hz(megahertz):
    return [1e6 * f for f in megahertz]
