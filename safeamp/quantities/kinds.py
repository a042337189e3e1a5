"""The kinds of quantity, each with its closed list of spellings and its believable range.

The ranges are common practice around audio power amplifiers, no source.
"""

from collections.abc import Mapping
from typing import Final

from safeamp.quantities.nouns import Kind, Sign

VOLTAGE: Final = Kind(
    "voltage",
    unit="V",
    base="volt",
    spellings={"V": "volt", "mV": "millivolt", "kV": "kilovolt"},
    shown=(("mV", "millivolt", 0.0), ("V", "volt", 1.0), ("kV", "kilovolt", 1e3)),
    believable=(1e-6, 1e3),
    example="35 V",
)
CURRENT: Final = Kind(
    "current",
    unit="A",
    base="ampere",
    spellings={"A": "ampere", "mA": "milliampere", "uA": "microampere", "µA": "microampere"},
    shown=(("µA", "microampere", 0.0), ("mA", "milliampere", 1e-3), ("A", "ampere", 1.0)),
    believable=(1e-9, 500.0),
    example="30 mA",
)
POWER: Final = Kind(
    "power",
    unit="W",
    base="watt",
    spellings={"W": "watt", "mW": "milliwatt", "kW": "kilowatt"},
    shown=(("mW", "milliwatt", 0.0), ("W", "watt", 1.0), ("kW", "kilowatt", 1e3)),
    believable=(1e-6, 2e4),
    example="60 W",
)
RESISTANCE: Final = Kind(
    "resistance",
    unit="ohm",
    base="ohm",
    spellings={
        "ohm": "ohm",
        "Ω": "ohm",
        "R": "ohm",
        "mohm": "milliohm",
        "kohm": "kiloohm",
        "Mohm": "megaohm",
    },
    # 0.22 ohm is printed as the trade marks it; milliohm only below a hundredth.
    shown=(
        ("mohm", "milliohm", 0.0),
        ("ohm", "ohm", 1e-2),
        ("kohm", "kiloohm", 1e3),
        ("Mohm", "megaohm", 1e6),
    ),
    believable=(1e-5, 1e11),
    example="8 ohm",
    iec60062=True,
)
CAPACITANCE: Final = Kind(
    "capacitance",
    unit="F",
    base="farad",
    spellings={
        "uF": "microfarad",
        "µF": "microfarad",
        "nF": "nanofarad",
        "pF": "picofarad",
        "mfd": "microfarad",
        "MFD": "microfarad",
    },
    shown=(("pF", "picofarad", 0.0), ("nF", "nanofarad", 1e-9), ("µF", "microfarad", 1e-6)),
    believable=(1e-13, 1.0),
    example="2200 uF",
    iec60062=True,
)
INDUCTANCE: Final = Kind(
    "inductance",
    unit="H",
    base="henry",
    spellings={"H": "henry", "mH": "millihenry", "uH": "microhenry"},
    shown=(("uH", "microhenry", 0.0), ("mH", "millihenry", 1e-3), ("H", "henry", 1.0)),
    believable=(1e-9, 100.0),
    example="0.5 mH",
)
FREQUENCY: Final = Kind(
    "frequency",
    unit="Hz",
    base="hertz",
    spellings={"Hz": "hertz", "kHz": "kilohertz"},
    shown=(("Hz", "hertz", 0.0), ("kHz", "kilohertz", 1e3)),
    believable=(1e-3, 1e7),
    example="50 Hz",
)
TIME: Final = Kind(
    "time",
    unit="s",
    base="second",
    spellings={"s": "second", "ms": "millisecond", "min": "minute", "h": "hour"},
    shown=(("ms", "millisecond", 0.0), ("s", "second", 1.0), ("min", "minute", 300.0), ("h", "hour", 7200.0)),
    believable=(1e-7, 1e7),
    example="60 ms",
)
TEMPERATURE: Final = Kind(
    "temperature",
    unit="degC",
    base="degree_Celsius",
    spellings={"degC": "degree_Celsius", "°C": "degree_Celsius", "K": "kelvin"},
    shown=(("°C", "degree_Celsius", 0.0),),
    believable=(-60.0, 500.0),
    example="35 degC",
    sign=Sign.ANY,
    possible=(-273.15, float("inf")),
    percent_tolerance=False,
    difference={"K": "kelvin"},
    guess=10.0,
)
TEMPERATURE_DIFFERENCE: Final = Kind(
    "temperature difference",
    unit="K",
    base="kelvin",
    spellings={"K": "kelvin"},
    shown=(("K", "kelvin", 0.0),),
    believable=(1e-4, 500.0),
    example="10 K",
    sign=Sign.ANY,
    guess=10.0,
)
THERMAL_RESISTANCE: Final = Kind(
    "thermal resistance",
    unit="K/W",
    base="kelvin / watt",
    spellings={"K/W": "kelvin / watt", "°C/W": "kelvin / watt", "degC/W": "kelvin / watt"},
    shown=(("K/W", "kelvin / watt", 0.0),),
    believable=(1e-4, 2e3),
    example="0.95 K/W",
)
LENGTH: Final = Kind(
    "length",
    unit="m",
    base="meter",
    spellings={"mm": "millimeter", "cm": "centimeter", "m": "meter"},
    shown=(("mm", "millimeter", 0.0), ("m", "meter", 1.0)),
    believable=(1e-6, 10.0),
    example="120 mm",
)
MASS: Final = Kind(
    "mass",
    unit="kg",
    base="kilogram",
    spellings={"g": "gram", "kg": "kilogram"},
    shown=(("g", "gram", 0.0), ("kg", "kilogram", 1.0)),
    believable=(1e-6, 1e3),
    example="25 g",
)
FORCE_FACTOR: Final = Kind(
    "force factor",
    unit="N/A",
    base="newton / ampere",
    spellings={"N/A": "newton / ampere", "T m": "tesla * meter"},
    shown=(("N/A", "newton / ampere", 0.0),),
    believable=(1e-2, 200.0),
    example="7.5 N/A",
)
COMPLIANCE: Final = Kind(
    "compliance",
    unit="m/N",
    base="meter / newton",
    spellings={"mm/N": "millimeter / newton"},
    shown=(("mm/N", "millimeter / newton", 0.0),),
    believable=(1e-6, 1.0),
    example="1.2 mm/N",
)
ANGLE: Final = Kind(
    "angle",
    unit="deg",
    base="degree",
    spellings={"deg": "degree"},
    shown=(("deg", "degree", 0.0),),
    believable=(0.0, 90.0),
    example="45 deg",
    sign=Sign.ANY,
    # Beyond 90 deg a passive load would deliver power.
    possible=(-90.0, 90.0),
    percent_tolerance=False,
    guess=15.0,
)
LEVEL: Final = Kind(
    "level",
    unit="dB",
    base="decibel",
    spellings={"dB": "decibel"},
    shown=(("dB", "decibel", 0.0),),
    believable=(0.0, 300.0),
    example="12 dB",
    sign=Sign.ANY,
    percent_tolerance=False,
)
PERCENT: Final = Kind(
    "percentage",
    unit="1",
    base="",
    spellings={"%": "percent"},
    shown=(("%", "percent", 0.0),),
    believable=(0.0, 10.0),
    example="20 %",
    sign=Sign.NON_NEGATIVE,
    percent_tolerance=False,
    # "80 % ±10 %" may mean 72 to 88 % or 70 to 90 %: only a range is read.
    difference={},
)
TRANSCONDUCTANCE_PARAMETER: Final = Kind(
    "transconductance parameter",
    unit="A/V2",
    base="ampere / volt ** 2",
    spellings={"A/V2": "ampere / volt ** 2", "A/V²": "ampere / volt ** 2"},
    shown=(("A/V2", "ampere / volt ** 2", 0.0),),
    believable=(1e-6, 1e3),
    example="2 A/V2",
)
TEMPERATURE_COEFFICIENT: Final = Kind(
    "temperature coefficient",
    unit="V/K",
    base="volt / kelvin",
    spellings={"mV/K": "millivolt / kelvin"},
    shown=(("mV/K", "millivolt / kelvin", 0.0),),
    believable=(1e-7, 1.0),
    example="-2 mV/K",
    sign=Sign.ANY,
)
RATIO: Final = Kind(
    "ratio",
    unit="1",
    base="",
    spellings={"": ""},
    shown=(("", "", 0.0),),
    believable=(1e-9, 1e9),
    example="0.8",
)
ENERGY: Final = Kind(
    "energy",
    unit="J",
    base="joule",
    spellings={},
    shown=(("mJ", "millijoule", 0.0), ("J", "joule", 1.0), ("kJ", "kilojoule", 1e3)),
    believable=(1e-9, 1e9),
    example="3 J",
)

KINDS: Final[Mapping[str, Kind]] = {
    kind.name: kind
    for kind in (
        VOLTAGE,
        CURRENT,
        POWER,
        RESISTANCE,
        CAPACITANCE,
        INDUCTANCE,
        FREQUENCY,
        TIME,
        TEMPERATURE,
        TEMPERATURE_DIFFERENCE,
        THERMAL_RESISTANCE,
        LENGTH,
        MASS,
        FORCE_FACTOR,
        COMPLIANCE,
        ANGLE,
        LEVEL,
        PERCENT,
        TRANSCONDUCTANCE_PARAMETER,
        TEMPERATURE_COEFFICIENT,
        RATIO,
        ENERGY,
    )
}
