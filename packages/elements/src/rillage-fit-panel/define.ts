import { define } from '../shared/define.js';
import { RillageFitPanel } from './rillage-fit-panel.js';

define('rillage-fit-panel', RillageFitPanel);
