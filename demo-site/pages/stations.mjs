import { FURTHER_STATIONS } from '../data/generator/further-stations.mjs';
import { STATIONS } from '../data/generator/stations.mjs';

/** The invented agency's streams, in the order in which its portal lists them. */
export const streams = [
  { ...STATIONS['thessle-brook'], ground: 'Loam and sandstone; the stream the agency knows best.' },
  ...FURTHER_STATIONS,
].map(({ id, name, ground }) => ({ id, name, ground, short: name.replace(/ at .*/, '') }));
