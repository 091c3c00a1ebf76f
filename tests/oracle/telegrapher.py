"""
A uniform line worked out a second time: 50 digits, another route, nothing of the package.

Not by its closed form (cosh, sinh, exp of gamma l). The coupled telegrapher's equations, with s the distance from the
antenna end,

    dV/ds = Z' I        dI/ds = Y' V

are integrated by their Taylor series over a short step, and the step is repeated along the line. What a wave does is
read from the eigenvalue of that step, not from sqrt(Z' Y').

Time factor exp(+j w t); lengths in m, frequencies in Hz, losses in dB. Functions take the name of one deliberate `flaw`
(see `described.FLAWS`), so that a comparison can be shown to notice it.
"""

from functools import lru_cache

from mpmath import MPContext

mp = MPContext()  # a context of its own: the precision set here concerns nobody else
mp.dps = 65  # 50 digits are promised; doubling a step 13 times and the eigenvalue of a step cost up to about 10

COPPER_PER_KELVIN = "0.00393"  # of resistivity, annealed copper at 20 C, IEC 60028
SPEED_OF_LIGHT = 299792458  # m/s
LONGEST_STEP = mp.mpf(1) / 4  # |Z' Y'|^(1/2) times the step: at 1/4 the series gains at least 1.4 digits per term
SERIES_ENDS_BELOW = mp.mpf(10) ** -70


def multiply(m, n):
    """Product of two chain matrices, each (a, b, c, d) for [[a, b], [c, d]]."""
    a, b, c, d = m
    e, f, g, h = n
    return a * e + b * g, a * f + b * h, c * e + d * g, c * f + d * h


def apply(m, voltage, current):
    """Voltage and current at the shack side of a chain matrix, from those at its antenna side."""
    a, b, c, d = m
    return a * voltage + b * current, c * voltage + d * current


def solve(m, voltage, current):
    """Voltage and current at the antenna side of a chain matrix, from those at its shack side."""
    a, b, c, d = m
    determinant = a * d - b * c
    return (d * voltage - b * current) / determinant, (a * current - c * voltage) / determinant


def line_constants(cable, frequency_hz, temperature_c, flaw=None):
    """Series impedance Z' [ohm/m] and shunt admittance Y' [S/m] of a cable at one temperature."""
    f_mhz = mp.mpf(frequency_hz) / 1000000
    omega = 2 * mp.pi * mp.mpf(frequency_hz)
    z_n = mp.mpf(cable.z0_ohm)
    warmer = mp.mpf(temperature_c) - 20
    copper = 1 if flaw == "no temperature" else 1 + mp.mpf(COPPER_PER_KELVIN) * warmer
    db_per_np = mp.mpf("8.686") if flaw == "rounded neper" else 20 / mp.ln(10)
    hundred = mp.mpf("30.48") if flaw == "feet for metres" else 100
    per_np = hundred * db_per_np
    conductor = cable.conductor_loss * mp.sqrt(f_mhz) / per_np
    conductor *= copper if flaw == "temperature squared" else mp.sqrt(copper)
    floor = cable.floor_loss / per_np * (mp.sqrt(copper) if flaw == "floor scaled once" else copper)
    dielectric = cable.dielectric_loss * f_mhz / per_np
    if flaw == "dielectric warmed":
        dielectric *= mp.sqrt(copper)

    delay = seconds_per_metre(cable, warmer, flaw)
    with_reactance = {"no skin reactance": 0, "floor with skin reactance": conductor + floor}.get(flaw, conductor)
    conductance = {"no conductance": 0, "conductance doubled": 4 * dielectric}.get(flaw, 2 * dielectric) / z_n
    time = -1 if flaw == "wrong time factor" else 1
    series = mp.mpc(2 * z_n * (conductor + floor), time * (omega * z_n * delay + 2 * z_n * with_reactance))
    shunt = mp.mpc(conductance, time * omega * delay / z_n)
    return series, shunt


def seconds_per_metre(cable, warmer, flaw=None):
    """High-frequency delay of one metre of cable [s/m], `warmer` degrees above 20 C."""
    if cable.delay_ns is not None:
        at_20_c = mp.mpf(cable.delay_ns) / 10**9 / mp.mpf(cable.length_m)
    else:
        speed = 300000000 if flaw == "round speed of light" else SPEED_OF_LIGHT
        at_20_c = 1 / (mp.mpf(cable.velocity_factor) * speed)
    sign = -1 if flaw == "delay tempco sign" else 1
    return at_20_c * (1 + sign * mp.mpf(cable.delay_tempco_ppm_per_k) / 10**6 * warmer)


def step_of(series, shunt, length):
    """
    Chain matrix of a short piece of line by the Taylor series of dV/ds = Z' I, dI/ds = Y' V.

    The k-th coefficients follow from the (k-1)-th: V_k = Z' I_(k-1) h / k, I_k = Y' V_(k-1) h / k. Started once with
    one volt and no current at the antenna side, once with one ampere and no voltage.
    """
    z, y = series * length, shunt * length
    columns = []
    for start in ((mp.mpf(1), mp.mpf(0)), (mp.mpf(0), mp.mpf(1))):
        v, i = voltage, current = start
        k = 0
        scale = mp.sqrt(abs(z) / abs(y))  # ohm; brings volts and amperes to one size for the stopping rule
        while abs(v) + scale * abs(i) > SERIES_ENDS_BELOW * (abs(voltage) + scale * abs(current)):
            k += 1
            v, i = z * i / k, y * v / k
            voltage += v
            current += i
        columns.append((voltage, current))
    (a, c), (b, d) = columns
    return a, b, c, d


@lru_cache(maxsize=64)  # asked twice per section: for its chain matrix and for its wave
def stepped_line(cable, frequency_hz, temperature_c, flaw=None):
    """The chain matrix of one step along a cable and the binary logarithm of the number of equal steps."""
    series, shunt = line_constants(cable, frequency_hz, temperature_c, flaw)
    length = mp.mpf(cable.length_m)
    doublings = 0
    while mp.sqrt(abs(series * shunt)) * length > LONGEST_STEP:
        length /= 2
        doublings += 1
    return step_of(series, shunt, length), doublings


def wave_over_cable(cable, frequency_hz, temperature_c, flaw=None):
    """Attenuation [Np] and phase [rad] that a travelling wave collects over a cable, from the eigenvalue of a step."""
    if cable.length_m == 0:
        return mp.mpf(0), mp.mpf(0)
    (a, b, c, d), doublings = stepped_line(cable, frequency_hz, temperature_c, flaw)
    half_trace = (a + d) / 2
    root = mp.sqrt(((a - d) / 2) ** 2 + b * c)
    growing = max(half_trace + root, half_trace - root, key=abs)  # towards the generator the wave is larger
    steps = 2**doublings
    return steps * mp.ln(abs(growing)), steps * abs(mp.arg(growing))


def chain_of_cable(cable, frequency_hz, temperature_c, flaw=None):
    """Chain matrix of a cable: the step, repeated. A cable without length is no cable."""
    if cable.length_m == 0:
        return mp.mpf(1), mp.mpf(0), mp.mpf(0), mp.mpf(1)
    step, doublings = stepped_line(cable, frequency_hz, temperature_c, flaw)
    for _ in range(doublings):
        step = multiply(step, step)
    return step
