import { daylightHours, extraterrestrialRadiation, netRadiation, radiationFromSunshine, radiationFromTemperature } from './radiation.js';

/** One day's weather. What is left out is estimated as FAO-56 says: see each field. */
export interface WeatherDay {
  /** Cel */
  tmin: number;
  tmax: number;
  /** Degrees north. */
  latitude: number;
  dayOfYear: number;
  /** Metres above sea level. */
  altitude: number;
  /** kPa; else from dew point, else from humidity, else from tmin as the dew point. */
  vapourPressure?: number;
  /** Cel */
  dewPoint?: number;
  /** % */
  humidityMax?: number;
  humidityMin?: number;
  humidityMean?: number;
  /** m/s at `windHeight` metres (default 2); else 2 m/s. */
  windSpeed?: number;
  windHeight?: number;
  /** MJ/m2/day; else from sunshine, else from the range of temperature. */
  solarRadiation?: number;
  /** hours */
  sunshine?: number;
  /** MJ/m2/day into the ground; 0 for single days. */
  soilHeat?: number;
}

/**
 * Reference evapotranspiration of grass:
 * ET_0 = [0.408 Δ (R_n − G) + γ · 900/(T + 273) · u_2 (e_s − e_a)] / [Δ + γ (1 + 0.34 u_2)].
 * @returns mm/day, not below 0; NaN where a temperature is NaN
 * @source Allen et al. 1998 (FAO-56), eq. 6 and those named beside each helper (equation numbers from memory)
 */
export function penmanMonteith(day: WeatherDay): number {
  const tmean = (day.tmin + day.tmax) / 2;
  const saturation = meanSaturation(day.tmin, day.tmax);
  const vapour = Math.min(saturation, actualVapour(day));
  const top = extraterrestrialRadiation(day.latitude, day.dayOfYear);
  const radiation =
    day.solarRadiation ??
    (day.sunshine === undefined
      ? radiationFromTemperature(day.tmin, day.tmax, top)
      : radiationFromSunshine(day.sunshine, daylightHours(day.latitude, day.dayOfYear), top));
  const net = netRadiation({ radiation, topOfAtmosphere: top, altitude: day.altitude, tmin: day.tmin, tmax: day.tmax, vapour });
  const delta = saturationSlope(tmean);
  const gamma = psychrometricConstant(day.altitude);
  const wind = day.windSpeed === undefined ? 2 : windAtTwoMetres(day.windSpeed, day.windHeight ?? 2);
  const energy = 0.408 * delta * (net - (day.soilHeat ?? 0));
  const drying = gamma * (900 / (tmean + 273)) * wind * (saturation - vapour);
  return Math.max(0, (energy + drying) / (delta + gamma * (1 + 0.34 * wind)));
}

/** e°(T) = 0.6108 exp(17.27 T / (T + 237.3)), kPa. @source FAO-56 eq. 11 (from memory) */
export function saturationPressure(temperature: number): number {
  return 0.6108 * Math.exp((17.27 * temperature) / (temperature + 237.3));
}

/** Mean of the pressures at the extremes, kPa. @source FAO-56 eq. 12 (from memory) */
export function meanSaturation(tmin: number, tmax: number): number {
  return (saturationPressure(tmax) + saturationPressure(tmin)) / 2;
}

/** Δ = 4098 e°(T) / (T + 237.3)², kPa per degree. @source FAO-56 eq. 13 (from memory) */
export function saturationSlope(temperature: number): number {
  return (4098 * saturationPressure(temperature)) / (temperature + 237.3) ** 2;
}

/** P = 101.3 ((293 − 0.0065 z)/293)^5.26, kPa. @source FAO-56 eq. 7 (from memory) */
export function airPressure(altitude: number): number {
  return 101.3 * ((293 - 0.0065 * altitude) / 293) ** 5.26;
}

/** γ = 0.665e-3 P, kPa per degree. @source FAO-56 eq. 8 (from memory) */
export function psychrometricConstant(altitude: number): number {
  return 0.665e-3 * airPressure(altitude);
}

/** u_2 = u_z 4.87 / ln(67.8 z − 5.42), m/s. @source FAO-56 eq. 47 (from memory) */
export function windAtTwoMetres(speed: number, height: number): number {
  return height === 2 ? speed : (speed * 4.87) / Math.log(67.8 * height - 5.42);
}

/** By the best thing known, in the order of FAO-56: dew point, both humidities, the highest, the mean, the night's lowest temperature. @source eq. 14, 17 to 19, 48 (from memory) */
function actualVapour(day: WeatherDay): number {
  if (day.vapourPressure !== undefined) return day.vapourPressure;
  if (day.dewPoint !== undefined) return saturationPressure(day.dewPoint);
  const { humidityMax, humidityMin } = day;
  if (humidityMax !== undefined && humidityMin !== undefined) {
    return (saturationPressure(day.tmin) * humidityMax + saturationPressure(day.tmax) * humidityMin) / 200;
  }
  if (humidityMax !== undefined) return (saturationPressure(day.tmin) * humidityMax) / 100;
  if (day.humidityMean !== undefined) return (meanSaturation(day.tmin, day.tmax) * day.humidityMean) / 100;
  return saturationPressure(day.tmin);
}
