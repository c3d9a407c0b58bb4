"""Random but repeatable sites, instants and Hipparcos stars, as the text the tables hold: values are computed from that text."""

import datetime
import math

# HIP number: (name, radial velocity in km/s from memory, times drawn). Near or fast stars, and stars about both poles.
SINGLED_OUT = {
    32349: ("Sirius", "-5.5", 5),
    87937: ("Barnard's Star", "-110.5", 6),
    104214: ("61 Cyg A", "-65.8", 6),
    104217: ("61 Cyg B", "-64.4", 3),
    19849: ("40 Eri A", "-42.3", 6),
    71683: ("alpha Cen A", "-21.4", 3),
    11767: ("Polaris", "0", 6),
    72607: ("beta UMi", "0", 4),
    116727: ("gamma Cep", "0", 4),
    104382: ("sigma Oct", "0", 4),
    70638: ("delta Oct", "0", 3),
}


def site(chance):
    """Latitude, longitude [deg], elevation [m] as text."""
    return f"{chance.uniform(-65, 65):.6f}", f"{chance.uniform(-180, 180):.6f}", f"{chance.uniform(0, 3000):.1f}"


def utc(chance, first=1975, last=2048):
    """RFC 3339 to the millisecond. Never a second of 23:59:60."""
    start = datetime.datetime(first, 1, 1)
    span = (datetime.datetime(last + 1, 1, 1) - start).total_seconds()
    instant = start + datetime.timedelta(milliseconds=chance.randrange(int(span * 1000)))
    return instant.strftime("%Y-%m-%dT%H:%M:%S.") + f"{instant.microsecond // 1000:03d}Z"


def dut1(chance):
    """UT1 - UTC in seconds."""
    return f"{chance.uniform(-0.9, 0.9):.6f}"


def stars(chance, path, bands):
    """Those singled out, then `count` random ones of each (faintest Hp, count) band, as the cells hip .. rv_km_s of a row."""
    rows = {}
    with open(path, encoding="ascii") as lines:
        for line in lines:
            hip = int(line[0:6])
            parallax = float(line[43:50])
            rows[hip] = (
                f"{math.degrees(float(line[15:28])):.10f}",
                f"{math.degrees(float(line[29:42])):.10f}",
                f"{float(line[51:59]):.2f}",
                f"{float(line[60:68]):.2f}",
                f"{parallax:.2f}",
                float(line[129:136]),
            )
    chosen = []
    for hip, (name, rv, times) in SINGLED_OUT.items():
        chosen += [(hip, name, rv)] * times
    brighter = -9.0
    for fainter, count in bands:
        # A parallax that came out negative has no agreed meaning as a distance, so such stars are left out.
        band = [hip for hip, cells in sorted(rows.items()) if brighter < cells[5] <= fainter and float(cells[4]) > 0.0 and hip not in SINGLED_OUT]
        chosen += [(hip, "", "0") for hip in chance.sample(band, count)]
        brighter = fainter
    return [(str(hip), name, f"{rows[hip][5]:.2f}", "J1991.25", *rows[hip][:5], rv) for hip, name, rv in chosen]


def catalogue_radians(star):
    """The cells of `stars` as ERFA wants them: rad, rad, rad/yr (with cos dec), rad/yr, arcsec, km/s."""
    ra, dec, pm_ra, pm_dec, parallax, rv = (float(cell) for cell in star[4:10])
    mas = math.radians(1 / 3.6e6)
    return math.radians(ra), math.radians(dec), pm_ra * mas, pm_dec * mas, parallax / 1000.0, rv
