"""Constants, distances, magnitudes and black bodies through Astropy's units."""
import numpy as np
from astropy import constants as const
from astropy import units as u
from astropy.coordinates import Distance
from astropy.modeling.models import BlackBody

H_WAVELENGTH = 1.644 * u.um
H_ZERO_FLUX = 1.18e-9 * u.W / u.m**2 / u.um


def constants(_):
    values = [
        const.au, const.pc, const.L_bol0, const.GM_sun, const.GM_jup, const.GM_earth,
        const.R_jup, const.R_sun, const.L_sun, const.h, const.c, const.k_B, const.sigma_sb,
    ]
    return [*(value.si.value for value in values), (1 * u.lyr).si.value]


def photometry(parallax, contrast):
    distance = Distance(parallax=parallax * u.mas)
    ratio = (contrast * u.mag).to(u.dimensionless_unscaled, u.logarithmic())
    return [distance.pc, distance.distmod.value, ratio.value]


def period(axis, mass):
    cube = (axis * u.au) ** 3 / (mass * const.GM_sun)
    days = (2 * np.pi * np.sqrt(cube)).to_value(u.day)
    return [days, axis]


def radiance(wavelength, temperature):
    law = BlackBody(temperature * u.K, scale=1 * u.W / u.m**2 / u.um / u.sr)
    return law(wavelength)


def planck(wavelength, temperature):
    return radiance(wavelength * u.um, temperature).to_value(u.W / u.m**2 / u.um / u.sr)


def cooled_body(mass, age):
    """Burrows, Hubbard, Lunine & Liebert 2001, Rev. Mod. Phys. 73, 719, opacity 0.01 cm^2/g."""
    gm = mass * const.GM_jup
    share = (gm / const.GM_sun).si.value / 0.05
    teff = 1550 * u.K * (1000 / age) ** 0.32 * share**0.83
    # R = 6.7e9 cm (1e5/g)^0.18 (T/1000 K)^0.11 with g = GM/R^2, solved by repeating it.
    radius = 7e9 * u.cm
    for _ in range(200):
        gravity = (gm / radius**2).to_value(u.cm / u.s**2)
        radius = 6.7e9 * u.cm * (1e5 / gravity) ** 0.18 * (teff / (1000 * u.K)) ** 0.11
    luminosity = 4 * np.pi * radius**2 * const.sigma_sb * teff**4
    flux = np.pi * u.sr * radiance(H_WAVELENGTH, teff.value) * (radius / (10 * u.pc)) ** 2
    return [
        teff.value,
        radius.to_value(u.m),
        luminosity.to_value(u.L_sun),
        -2.5 * np.log10((luminosity / const.L_bol0).to_value(u.dimensionless_unscaled)),
        -2.5 * np.log10((flux / H_ZERO_FLUX).to_value(u.dimensionless_unscaled)),
    ]
