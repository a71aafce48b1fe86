import { expect } from 'chai';
import { guessLayout, readForcing, rerunReceipt, type Layout } from '@rillage/sdk';
import type { ForcingDetail, RillageForcingInput } from '../../../packages/elements/src/rillage-forcing-input/rillage-forcing-input.js';
import '../../../packages/elements/src/rillage-forcing-input/define.js';
import { answering, clear, mount, part, settled, shown, until } from './help.js';
