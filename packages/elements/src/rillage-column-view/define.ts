import { define } from '../shared/define.js';
import { RillageColumnView } from './rillage-column-view.js';

define('rillage-column-view', RillageColumnView);
