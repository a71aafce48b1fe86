import { define } from '../shared/define.js';
import { RillageExplorer } from './rillage-explorer.js';

define('rillage-explorer', RillageExplorer);
