import { define } from '../shared/define.js';
import { RillageReading } from './rillage-reading.js';

define('rillage-reading', RillageReading);
