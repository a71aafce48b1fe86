import { define } from '../shared/define.js';
import { RillageForcingInput } from './rillage-forcing-input.js';

define('rillage-forcing-input', RillageForcingInput);
