import { html, nothing, type TemplateResult } from 'lit';
import type { Filling, Issue, Prior } from '@rillage/sdk';
import type { Language } from '../shared/language.js';
import { cleanText } from '../shared/text.js';
import { fitPanelMessages, type FitPanelKey } from './messages.js';
import { asKind, fieldsOf, pathWords, priorsIn, withAt, type Placed } from './priors.js';
import { formNames, proposeCatchment, proposeError, tracersOf, type FitChoices, type FitRecord, type OpenCatchment } from './proposal.js';

export interface ChoicesProps {
  record: FitRecord;
  choices: FitChoices;
  issues: readonly Issue[];
  disabled: boolean;
  language: Language<FitPanelKey>;
  change: (choices: FitChoices) => void;
}

const RULES: Filling['rule'][] = ['seasonalPlusResidual', 'bulkConstant', 'randomRedistribution'];
/** The problem's own name for its first catchment. */
const FIRST = 'catchment';

/** Which samples, selections and fillings are to be tried, and what is believed of each unknown. */
export function choicesView(props: ChoicesProps): TemplateResult {
  const { record, choices, disabled, language } = props;
  const say = language.say.bind(language);
  const tracers = Object.keys(choices.errors);
  const catchments = catchmentsIn(choices);
  const names = new Set(catchments.map(([name]) => nameOf(name, choices)));
  const offered = [...names, ...formNames.filter((name) => !names.has(name))];
  return html`<div class="choices">
      <fieldset ?disabled=${disabled}>
        <legend>${say('fit.tracers')}</legend>
        ${tracersOf(record).map((tracer) =>
          tick(cleanText(tracer, 60), tracers.includes(tracer), (on) => props.change(withTracer(props, tracer, on))),
        )}
      </fieldset>
      <fieldset ?disabled=${disabled}>
        <legend>${say('fit.catchments')}</legend>
        ${offered.map((name) => tick(formWords(name, language), names.has(name), (on) => props.change(withForm(props, name, on))))}
      </fieldset>
      ${
        record.rainSamples?.length
          ? html`<fieldset ?disabled=${disabled}>
              <legend>${say('fit.fillings')}</legend>
              ${RULES.map((rule) => {
                const on = (choices.fillings ?? []).some((filling) => filling.rule === rule);
                return tick(say(`fit.filling.${rule}`), on, (to) => props.change(withFilling(choices, rule, to)));
              })}
            </fieldset>`
          : nothing
      }
    </div>
    ${catchments.map(([name, catchment]) =>
      priorsView(props, formWords(nameOf(name, choices), language), priorsIn(catchment, FIRST), (keys, prior) =>
        name === FIRST
          ? { ...choices, catchment: withAt(catchment, keys, prior) }
          : { ...choices, otherCatchments: { ...choices.otherCatchments, [name]: withAt(catchment, keys, prior) } },
      ),
    )}
    ${priorsView(props, say('fit.errors'), priorsIn(choices.errors, 'errors'), (keys, prior) => ({
      ...choices,
      errors: withAt(choices.errors, keys, prior),
    }))}`;
}

/** The words for a catchment of the choices, by the name that an alternative of the fit has. */
export function alternativeWords(name: string, choices: FitChoices | null, language: Language<FitPanelKey>): string {
  const [own = '', ...filling] = name.split(', ');
  const rule = filling.join(', ').split(' ')[0] ?? '';
  const key = `fit.filling.${rule}`;
  return [
    formWords(choices ? nameOf(own, choices) : own, language),
    Object.hasOwn(fitPanelMessages, key) ? language.say(key as FitPanelKey) : cleanText(filling.join(', '), 60),
  ]
    .filter(Boolean)
    .join('; ');
}

function priorsView(
  { issues, disabled, language, change }: ChoicesProps,
  what: string,
  placed: readonly Placed[],
  changed: (keys: (string | number)[], prior: Prior) => FitChoices,
): TemplateResult {
  const say = language.say.bind(language);
  const wrong = (path: string): boolean => issues.some((issue) => issue.path?.startsWith(path));
  return html`<details ?open=${placed.some(({ path }) => wrong(path))}>
    <summary>${say('fit.priors', { what })}</summary>
    ${placed.map(
      ({ path, keys, prior }) =>
        html`<div class="prior" role="group" aria-label=${cleanText(pathWords(path), 120)}>
          <span>${cleanText(pathWords(path), 120)}</span>
          <label
            >${say('fit.kind')}
            <select
              ?disabled=${disabled}
              @change=${(event: Event) => change(changed(keys, asKind(prior, (event.target as HTMLSelectElement).value as Prior['prior'])))}
            >
              ${Object.keys(fieldsOf).map(
                (kind) => html`<option value=${kind} .selected=${kind === prior.prior}>${say(`fit.${kind}` as FitPanelKey)}</option>`,
              )}
            </select></label
          >
          ${(fieldsOf[prior.prior] ?? []).map(
            (field) =>
              html`<label
                >${say(`fit.${field}` as FitPanelKey)}
                <input
                  type="number"
                  step="any"
                  ?disabled=${disabled}
                  aria-invalid=${wrong(path) ? 'true' : nothing}
                  .value=${String((prior as unknown as Record<string, number | undefined>)[field] ?? '')}
                  @change=${(event: Event) => {
                    const { valueAsNumber } = event.target as HTMLInputElement;
                    change(changed(keys, { ...prior, [field]: valueAsNumber } as Prior));
                  }}
              /></label>`,
          )}
        </div>`,
    )}
  </details>`;
}

function tick(words: string, on: boolean, change: (on: boolean) => void): TemplateResult {
  return html`<label class="tick"
    ><input type="checkbox" .checked=${on} @change=${(event: Event) => change((event.target as HTMLInputElement).checked)} />${words}</label
  >`;
}

const catchmentsIn = ({ catchment, otherCatchments }: FitChoices): [string, OpenCatchment][] => [
  [FIRST, catchment],
  ...Object.entries(otherCatchments ?? {}),
];

/** The first catchment has no name of its own; it is called by the form that it was proposed with, where it is one of these. */
function nameOf(name: string, { catchment }: FitChoices): string {
  if (name !== FIRST) return name;
  const selection = (catchment.selection['discharge'] ?? Object.values(catchment.selection)[0]) as unknown as Record<string, unknown>;
  const { form, scale } = (selection ?? {}) as { form?: string; scale?: object };
  if (form === 'gamma') return scale && 'driver' in scale ? 'gammaWithStorage' : 'gammaSteady';
  return form === 'exponential' ? 'exponentialSteady' : (form ?? name);
}

function formWords(name: string, language: Language<FitPanelKey>): string {
  const key = `fit.form.${name}`;
  return Object.hasOwn(fitPanelMessages, key) ? language.say(key as FitPanelKey) : cleanText(name, 60);
}

/** With one form more or less; the last one stays. */
function withForm({ record, choices }: ChoicesProps, form: string, on: boolean): FitChoices {
  const others = { ...choices.otherCatchments };
  if (on) return { ...choices, otherCatchments: { ...others, [form]: proposeCatchment(record, form, Object.keys(choices.errors)) } };
  if (Object.hasOwn(others, form)) {
    delete others[form];
    return { ...choices, otherCatchments: others };
  }
  const next = Object.keys(others)[0];
  if (next === undefined) return { ...choices };
  const { [next]: catchment, ...rest } = others;
  return { ...choices, catchment: catchment!, otherCatchments: rest };
}

function withTracer({ record, choices }: ChoicesProps, tracer: string, on: boolean): FitChoices {
  const { [tracer]: _error, ...others } = choices.errors;
  if (!on && Object.keys(others).length === 0) return { ...choices };
  const proposed = proposeCatchment(record, formNames[0]!, [tracer]).tracers![tracer]!;
  const settle = (catchment: OpenCatchment): OpenCatchment => {
    const { [tracer]: _rule, ...rest } = catchment.tracers ?? {};
    return { ...catchment, tracers: on ? { ...rest, [tracer]: proposed } : rest };
  };
  return {
    ...choices,
    catchment: settle(choices.catchment),
    otherCatchments: Object.fromEntries(Object.entries(choices.otherCatchments ?? {}).map(([name, one]) => [name, settle(one)])),
    errors: on ? { ...choices.errors, [tracer]: proposeError(record, tracer) } : others,
  };
}

function withFilling(choices: FitChoices, rule: Filling['rule'], on: boolean): FitChoices {
  const { fillings = [], ...rest } = choices;
  const kept = fillings.filter((filling) => filling.rule !== rule);
  const now: Filling[] = on ? [...kept, { rule, uncovered: 'amountWeightedMean' }] : [...kept];
  return now.length > 0 ? { ...rest, fillings: now } : rest;
}
