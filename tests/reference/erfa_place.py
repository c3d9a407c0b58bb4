"""Topocentric apparent places by ERFA (the C library that SOFA's authors allow under that name), airless.

Angles in radians in here; longitude east positive, hour angle west positive, azimuth from north through east.
Polar motion is zero and pressure is zero throughout. requires: pyerfa==2.0.1.5, numpy==2.4.6
"""

import datetime
import warnings

import erfa
import numpy as np

# ERFA calls a UTC beyond the release of its leap-second table "dubious"; TAI-UTC stays at 37 s there, as intended.
warnings.filterwarnings("ignore", category=erfa.ErfaWarning, message=".*dubious year.*")

LIGHT_DAY_AU = 173.1446326742403
J1991_25 = (2448349.0625, 0.0)
J2000 = (2451545.0, 0.0)


def utc_text(instant):
    """RFC 3339 to the millisecond."""
    return instant.strftime("%Y-%m-%dT%H:%M:%S.") + f"{instant.microsecond // 1000:03d}Z"


def utc_pair(text):
    """ERFA's quasi Julian Date of UTC from RFC 3339."""
    t = datetime.datetime.fromisoformat(text.replace("Z", "+00:00"))
    return erfa.dtf2d("UTC", t.year, t.month, t.day, t.hour, t.minute, t.second + t.microsecond / 1e6)


def tai_minus_utc(text):
    """Seconds."""
    t = datetime.datetime.fromisoformat(text.replace("Z", "+00:00"))
    return float(erfa.dat(t.year, t.month, t.day, 0.0))


def tt_pair(utc):
    return erfa.taitt(*erfa.utctai(*utc))


def sidereal(utc, dut1, longitude):
    """Local apparent (2006/2000A) and local mean (2006) sidereal time."""
    ut1 = erfa.utcut1(*utc, dut1)
    tt = tt_pair(utc)
    return (erfa.anp(erfa.gst06a(*ut1, *tt) + longitude), erfa.anp(erfa.gmst06(*ut1, *tt) + longitude))


def observer(utc, dut1, longitude, latitude, elevation_m):
    """ERFA's star-independent parameters and the equation of the origins."""
    return erfa.apco13(*utc, dut1, longitude, latitude, elevation_m, 0.0, 0.0, 0.0, 0.0, 0.0, 0.55)


def from_cirs(ri, di, astrom, eo):
    """Dictionary of the topocentric place from CIRS right ascension and declination."""
    azimuth, zenith, hour_angle, declination, ra_cio = erfa.atioq(ri, di, astrom)
    return {
        "hour_angle": erfa.anpm(hour_angle),
        "declination": declination,
        "ra_of_date": erfa.anp(ra_cio - eo),
        "azimuth": erfa.anp(azimuth),
        "altitude": np.pi / 2 - zenith,
    }


def star(utc, dut1, longitude, latitude, elevation_m, catalogue):
    """Place of a star: `catalogue` is (ra, dec, pm_ra*cos(dec), pm_dec [rad, rad/yr], parallax ["], rv [km/s]), ICRS at J1991.25."""
    ra, dec, pm_ra_cosdec, pm_dec, parallax, rv = catalogue
    at_j2000 = erfa.pmsafe(ra, dec, pm_ra_cosdec / np.cos(dec), pm_dec, parallax, rv, *J1991_25, *J2000)
    astrom, eo = observer(utc, dut1, longitude, latitude, elevation_m)
    ri, di = erfa.atciq(*at_j2000, astrom)
    return from_cirs(ri, di, astrom, eo)


def body(utc, dut1, longitude, latitude, elevation_m, barycentric, sun_deflects, earth=None):
    """Place of a body of the solar system, with its distance [au].

    `barycentric(jd1, jd2)` gives its ICRS position [au] from the barycentre at a TT (taken for TDB). `earth`, if given, is a function for
    the Earth's (heliocentric position, barycentric position, barycentric velocity) [au, au/day] in place of ERFA's epv00, so that Moon
    and Earth can come from one ephemeris.
    """
    tt = tt_pair(utc)
    astrom, eo = observer(utc, dut1, longitude, latitude, elevation_m)
    if earth is not None:
        heliocentric, position, velocity = earth(*tt)
        ebpv = np.zeros((), dtype=erfa.dt_pv)
        ebpv["p"], ebpv["v"] = position, velocity
        x, y, s = erfa.xys06a(*tt)
        ut1 = erfa.utcut1(*utc, dut1)
        astrom = erfa.apco(
            *tt, ebpv, heliocentric, x, y, s, erfa.era00(*ut1), longitude, latitude, elevation_m, 0.0, 0.0, erfa.sp00(*tt), 0.0, 0.0
        )
        eo = erfa.eors(erfa.pnm06a(*tt), s)
    light_time = 0.0
    for _ in range(6):
        path = barycentric(tt[0], tt[1] - light_time) - astrom["eb"]
        distance = np.linalg.norm(path)
        light_time = distance / LIGHT_DAY_AU
    direction = path / distance
    if sun_deflects:
        from_sun = path + astrom["eb"] - (astrom["eb"] - astrom["eh"] * astrom["em"])
        direction = erfa.ld(1.0, direction, from_sun / np.linalg.norm(from_sun), astrom["eh"], astrom["em"], 1e-6)
    natural = erfa.ab(direction, astrom["v"], astrom["em"], astrom["bm1"])
    ri, di = erfa.c2s(erfa.rxp(astrom["bpn"], natural))
    place = from_cirs(erfa.anp(ri), di, astrom, eo)
    place["distance"] = distance
    return place
