import { define } from '../shared/define.js';
import { RillageAgeHistory } from './rillage-age-history.js';

define('rillage-age-history', RillageAgeHistory);
