import { extraterrestrialRadiation } from './radiation.js';

/** Converts MJ/m2/day to mm/day of evaporation: 1/λ with λ = 2.45 MJ/kg. Source: FAO-56 eq. 20 (from memory). */
const MM_PER_MEGAJOULE = 0.408;

/**
 * Reference evapotranspiration from temperature and latitude: ET_0 = 0.0023 (T_mean + 17.8) √(T_max − T_min) · 0.408 R_a.
 * @param day.tmin, day.tmax Cel; day.tmean Cel, their mean where absent
 * @param day.latitude degrees north; day.dayOfYear 1 to 366
 * @returns mm/day, not below 0; NaN where a temperature is NaN
 * @source Allen et al. 1998 (FAO-56), eq. 52, after Hargreaves and Samani 1985 (equation number from memory)
 */
export function hargreaves(day: { tmin: number; tmax: number; tmean?: number; latitude: number; dayOfYear: number }): number {
  const tmean = day.tmean ?? (day.tmin + day.tmax) / 2;
  const range = Math.max(0, day.tmax - day.tmin);
  return Math.max(
    0,
    0.0023 * (tmean + 17.8) * Math.sqrt(range) * MM_PER_MEGAJOULE * extraterrestrialRadiation(day.latitude, day.dayOfYear),
  );
}
