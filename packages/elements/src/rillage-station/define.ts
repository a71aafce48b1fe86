import { define } from '../shared/define.js';
import { RillageStation } from './rillage-station.js';

define('rillage-station', RillageStation);
