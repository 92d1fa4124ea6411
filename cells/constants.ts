// Physical constants, SI. Everything else in cells/ takes them from here.

/** Speed of light in vacuum, m/s; exact by definition of the metre (SI, 1983). */
export const speedOfLight = 299_792_458;

/** Permeability of vacuum, H/m. CODATA 2018: 1.256 637 062 12(19)e-6. */
export const vacuumPermeability = 1.256_637_062_12e-6;

/** Wave impedance of vacuum, ohm: η0 = μ0 c (376.730 313 67 with CODATA 2018). */
export const vacuumImpedance = vacuumPermeability * speedOfLight;
