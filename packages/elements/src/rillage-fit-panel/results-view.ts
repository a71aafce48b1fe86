import { html, nothing, type TemplateResult } from 'lit';
import type { Fit, Help, TracerDiagnosis } from '@rillage/sdk';
import type { DataTable } from '../shared/data-table.js';
import { ageSpan, date, number, percent, percentSpan } from '../shared/format.js';
import type { Language } from '../shared/language.js';
import { cleanText } from '../shared/text.js';
import { alternativeWords } from './choices-view.js';
import type { FitPanelKey } from './messages.js';
import { isInside, scatter, strip } from './pictures.js';
import { pathWords } from './priors.js';
import type { FitChoices } from './proposal.js';

export interface ResultsProps {
  fit: Fit;
  choices: FitChoices | null;
  language: Language<FitPanelKey>;
  table: DataTable;
  /** The tracer whose samples stand as a table. */
  tableOf: string;
  showTable: (tracer: string) => void;
}

type Words = (value: number) => string;

/** What the fit says, the gravest first. */
export function resultsView(props: ResultsProps): TemplateResult {
  const { fit, language } = props;
  const say = language.say.bind(language);
  const digits: Words = (value) =>
    Number.isFinite(value) ? number(language.tag, { maximumSignificantDigits: 3 }).format(value) : say('amount.unknown');
  return html`<section part="result">
    <p class=${fit.converged && !fit.partial ? 'state' : 'state grave'} part="outcome">
      ${say(fit.partial ? 'fit.stopped' : fit.converged ? 'fit.converged' : 'fit.notConverged', { count: fit.evaluations })}
      ${fit.impossibleShare > 0 ? say('fit.impossible', { share: percent(language, fit.impossibleShare) }) : nothing}
      ${fit.partial ? nothing : say(fit.inputDoubtInRange ? 'fit.doubt' : 'fit.noDoubt')}
    </p>
    ${findings(fit, say('fit.findings'))} ${parameters(props, digits)} ${scores(props, digits)} ${alternatives(props)} ${crossChecks(props)}
  </section>`;
}

function findings({ findings }: Fit, name: string): TemplateResult | typeof nothing {
  if (findings.length === 0) return nothing;
  return html`<h3>${name}</h3>
    <ul>
      ${findings.map(({ code, seen, done, settle }) => html`<li>${cleanText([seen, done, settle].filter(Boolean).map(asSentence).join(' ') || code, 500)}</li>`)}
    </ul>`;
}

const asSentence = (words = ''): string => (/[.!?]$/.test(words) ? words : `${words}.`);

function parameters({ fit, language }: ResultsProps, digits: Words): TemplateResult | typeof nothing {
  const say = language.say.bind(language);
  if (fit.parameters.length === 0) return nothing;
  const span = ([low, , high]: readonly number[]): string => say('fit.span', { low: digits(low!), high: digits(high!) });
  return html`<h3>${say('fit.parameters')}</h3>
    <div class="wide" tabindex="0" role="group" aria-label=${say('fit.parameters')}>
      <table part="table">
        <thead>
          <tr>
            ${(['fit.unknown', 'fit.before', 'fit.after', 'fit.picture', 'fit.verdict'] as const).map((key) => html`<th scope="col">${say(key)}</th>`)}
          </tr>
        </thead>
        <tbody>
          ${fit.parameters.map(
            (one) =>
              html`<tr>
                <th scope="row">${cleanText(pathWords(one.path), 120)}</th>
                <td>${span(one.before)}</td>
                <td>${span(one.after)}</td>
                <td>${strip(one)}</td>
                <td>${say(`fit.${one.verdict}`)}</td>
              </tr>`,
          )}
        </tbody>
      </table>
    </div>`;
}

function scores(props: ResultsProps, digits: Words): TemplateResult | typeof nothing {
  const { fit, language } = props;
  const say = language.say.bind(language);
  const tracers = Object.entries(fit.tracers);
  if (tracers.length === 0) return nothing;
  const score = number(language.tag, { minimumFractionDigits: 2, maximumFractionDigits: 2 });
  const shown: Words = (value) => (Number.isFinite(value) ? score.format(value) : say('amount.unknown'));
  const columns = [say('fit.tracer'), say('fit.count'), 'NSE', 'KGE 2009', 'KGE 2012', say('fit.inside')];
  return html`<h3>${say('fit.scores')}</h3>
    ${rows(
      say('fit.scores'),
      columns,
      tracers.map(([tracer, one]) => [
        cleanText(tracer, 60),
        String(one.count),
        shown(one.nse),
        shown(one.kge2009),
        shown(one.kge2012),
        say('fit.insideOf', { half: percent(language, one.coverage50.share), nine: percent(language, one.coverage90.share) }),
      ]),
    )}
    ${tracers.map(([tracer, one]) => samples(props, tracer, one, digits))}`;
}

function samples(
  { language, table, tableOf, showTable }: ResultsProps,
  tracer: string,
  { residuals }: TracerDiagnosis,
  digits: Words,
): TemplateResult | typeof nothing {
  if (residuals.length === 0) return nothing;
  const say = language.say.bind(language);
  const name = cleanText(tracer, 60);
  const inside = residuals.filter(isInside).length;
  const words = say('fit.scatter', { tracer: name, inside, count: residuals.length });
  const year = (time: number): string => date(language.tag, time, { year: 'numeric' });
  const open = tableOf === tracer;
  return html`<figure part="picture">
      <div class="wide" tabindex="0" role="group" aria-label=${name}>${scatter(residuals, words, digits, year)}</div>
      <figcaption>${words}</figcaption>
    </figure>
    <p class="actions">
      <button type="button" part="button" aria-expanded=${open ? 'true' : 'false'} @click=${() => showTable(open ? '' : tracer)}>
        ${say('fit.table', { tracer: name })}
      </button>
    </p>
    ${
      open
        ? table.render({
            caption: words,
            columns: [say('fit.date'), say('fit.measured'), say('fit.simulated'), say('fit.flow')],
            rows: residuals.map((one) => [
              date(language.tag, one.at, { dateStyle: 'medium' }),
              digits(one.measured),
              say('fit.span', { low: digits(one.low), high: digits(one.high) }),
              digits(one.flow),
            ]),
          })
        : nothing
    }`;
}

function alternatives({ fit, choices, language }: ResultsProps): TemplateResult {
  const say = language.say.bind(language);
  const columns = [say('fit.alternative'), say('fit.weight'), say('fit.young'), say('fit.medianAge'), say('fit.outcome')];
  return html`<h3>${say('fit.alternatives')}</h3>
    ${rows(
      say('fit.alternatives'),
      columns,
      fit.alternatives.map(({ name, weight, outcome, ages }) => {
        const young = ages?.younger['30'];
        return [
          alternativeWords(name, choices, language),
          percent(language, weight),
          young ? percentSpan(language, { low: young[0], high: young[2] }) : '',
          ages ? ageSpan(language, ages.medianDays[0], ages.medianDays[2], ages.medianBeyondRecord > 0.05) : '',
          say(`fit.outcome.${outcome}`),
        ];
      }),
    )}`;
}

function crossChecks({ fit, language }: ResultsProps): TemplateResult | typeof nothing {
  if (fit.crossCheck.length === 0) return nothing;
  const say = language.say.bind(language);
  const columns = [say('fit.tracer'), say('fit.threshold'), say('fit.seasonal'), say('fit.fitted'), say('fit.agreement')];
  return html`<h3>${say('fit.crossCheck')}</h3>
    ${rows(
      say('fit.crossCheck'),
      columns,
      fit.crossCheck.map(({ tracer, days, byFlow }) => [
        cleanText(tracer, 60),
        number(language.tag, { style: 'unit', unit: 'day', unitDisplay: 'long', maximumFractionDigits: 0 }).format(days),
        `${percent(language, byFlow.seasonal)} ± ${percent(language, byFlow.seasonalError)}`,
        percentSpan(language, { low: byFlow.fitted[0], high: byFlow.fitted[2] }),
        say(byFlow.agrees ? 'fit.agrees' : 'fit.differs'),
      ]),
    )}`;
}

/** Plans of further samples, the most helpful first. */
export function helpView(plans: readonly Help[], language: Language<FitPanelKey>): TemplateResult {
  const say = language.say.bind(language);
  const whole = number(language.tag, { maximumFractionDigits: 0 });
  const change = ({ before, after }: Help['younger'], words: Words): string =>
    Number.isFinite(before) ? say('fit.change', { before: words(before), after: words(after) }) : say('amount.unknown');
  return html`<p class="note">${say('fit.helpNote')}</p>
    ${rows(
      say('fit.help'),
      [say('fit.plan'), say('fit.widthMedian'), say('fit.widthYoung')],
      plans
        .slice(0, 8)
        .map((plan) => [
          say(`fit.when.${plan.when}`, { count: plan.count, tracer: cleanText(plan.tracer, 60) }),
          change(plan.medianDays, (days) => whole.format(days)),
          change(plan.younger, (share) => number(language.tag, { style: 'percent', maximumFractionDigits: 1 }).format(share)),
        ]),
    )}`;
}

function rows(name: string, columns: readonly string[], body: readonly (readonly string[])[]): TemplateResult {
  return html`<div class="wide" tabindex="0" role="group" aria-label=${name}>
    <table part="table">
      <thead>
        <tr>
          ${columns.map((column) => html`<th scope="col">${column}</th>`)}
        </tr>
      </thead>
      <tbody>
        ${body.map(
          (row) =>
            html`<tr>
              ${row.map((cell, index) => (index ? html`<td>${cell}</td>` : html`<th scope="row">${cell}</th>`))}
            </tr>`,
        )}
      </tbody>
    </table>
  </div>`;
}
