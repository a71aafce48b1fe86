import { define } from '../shared/define.js';
import { RillageAgePlot } from './rillage-age-plot.js';

define('rillage-age-plot', RillageAgePlot);
