/** MJ/m2/min. Source: FAO-56 eq. 28. */
const SOLAR_CONSTANT = 0.082;
/** MJ/K4/m2/day, as printed with FAO-56 eq. 39. */
const STEFAN_BOLTZMANN = 4.903e-9;

/**
 * Radiation at the top of the atmosphere over a day:
 * R_a = (24·60/π) G_sc d_r (ω_s sin φ sin δ + cos φ cos δ sin ω_s).
 * @param latitude degrees north
 * @param dayOfYear 1 to 366
 * @returns MJ/m2/day; 0 in the polar night
 * @source Allen et al. 1998 (FAO-56), eq. 21 to 25 (equation numbers from memory)
 */
export function extraterrestrialRadiation(latitude: number, dayOfYear: number): number {
  const { phi, declination, sunset, distance } = sunGeometry(latitude, dayOfYear);
  const sum = sunset * Math.sin(phi) * Math.sin(declination) + Math.cos(phi) * Math.cos(declination) * Math.sin(sunset);
  return Math.max(0, ((24 * 60) / Math.PI) * SOLAR_CONSTANT * distance * sum);
}

/** Hours of possible sunshine, N = 24 ω_s / π. @source FAO-56 eq. 34 (from memory) */
export function daylightHours(latitude: number, dayOfYear: number): number {
  return (24 / Math.PI) * sunGeometry(latitude, dayOfYear).sunset;
}

/** Earth's distance (relative, inverse), declination and sunset hour angle, radians. The angle is 0 in the polar night and π under the midnight sun. */
export function sunGeometry(latitude: number, dayOfYear: number): { phi: number; declination: number; sunset: number; distance: number } {
  const phi = (latitude * Math.PI) / 180;
  const turn = (2 * Math.PI * dayOfYear) / 365;
  const declination = 0.409 * Math.sin(turn - 1.39);
  const sunset = Math.acos(Math.min(1, Math.max(-1, -Math.tan(phi) * Math.tan(declination))));
  return { phi, declination, sunset, distance: 1 + 0.033 * Math.cos(turn) };
}

/** R_s = (0.25 + 0.5 n/N) R_a, MJ/m2/day, from hours of sunshine. @source FAO-56 eq. 35 (from memory) */
export function radiationFromSunshine(sunshineHours: number, daylight: number, topOfAtmosphere: number): number {
  const share = daylight > 0 ? Math.min(1, sunshineHours / daylight) : 0;
  return (0.25 + 0.5 * share) * topOfAtmosphere;
}

/** R_s = k √(T_max − T_min) R_a, k = 0.16 inland and 0.19 at the coast. @source FAO-56 eq. 50 (from memory) */
export function radiationFromTemperature(tmin: number, tmax: number, topOfAtmosphere: number, k = 0.16): number {
  return k * Math.sqrt(Math.max(0, tmax - tmin)) * topOfAtmosphere;
}

/**
 * Net radiation at a grass surface: R_n = 0.77 R_s − σ mean(T_K⁴) (0.34 − 0.14 √e_a)(1.35 R_s/R_so − 0.35), R_so = (0.75 + 2e-5 z) R_a.
 * @returns MJ/m2/day
 * @source FAO-56 eq. 37 to 40 (from memory)
 */
export function netRadiation(day: {
  radiation: number;
  topOfAtmosphere: number;
  altitude: number;
  tmin: number;
  tmax: number;
  vapour: number;
}): number {
  const clearSky = (0.75 + 2e-5 * day.altitude) * day.topOfAtmosphere;
  const cloud = clearSky > 0 ? 1.35 * Math.min(1, day.radiation / clearSky) - 0.35 : 0;
  const fourth = ((day.tmax + 273.16) ** 4 + (day.tmin + 273.16) ** 4) / 2;
  return 0.77 * day.radiation - STEFAN_BOLTZMANN * fourth * (0.34 - 0.14 * Math.sqrt(day.vapour)) * cloud;
}
