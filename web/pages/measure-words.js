// Measures, their parameters and outputs in words, and a form's values as a call of the API. Pure.

import { absent, frequency, parseNumber, quantity } from '../numbers.js';

/** @typedef {{ name: string, required: boolean, range: string }} MeasureParameter */
/** @typedef {{ name: string, parameters: MeasureParameter[], takesReference: boolean, outputs: { name: string, unit: string }[] }} Measure   as GET /api/measures lists it */
/** @typedef {{ measure: string, parameters: Record<string, unknown> }} MeasureCall */

/** @type {Readonly<Record<string, string>>} */
const words = Object.freeze({
  level: 'Level at a frequency', phase: 'Phase at a frequency', delay: 'Group delay at a frequency', peak: 'Peak', bandwidth: 'Bandwidth', shapeFactor: 'Shape factor', ripple: 'Ripple in a band',
  attenuation: 'Attenuation in a band', slope: 'Slope in a band', loopMargins: 'Loop margins', excessPhase: 'Excess phase',
  frequencyHz: 'Frequency', fromHz: 'From', toHz: 'To', dropDb: 'Drop', outerDropDb: 'Outer drop', innerDropDb: 'Inner drop', apertureRatio: 'Aperture, upper to lower end', criticalPhaseDeg: 'Critical phase',
  gainDb: 'Gain', phaseDeg: 'Phase', delaySeconds: 'Delay', lowerHz: 'Lower cutoff', upperHz: 'Upper cutoff', bandwidthHz: 'Bandwidth', centreHz: 'Centre', q: 'Q', fractional: 'Fractional bandwidth',
  ratio: 'Ratio', rippleDb: 'Ripple', attenuationDb: 'Attenuation', dbPerDecade: 'Slope a decade', dbPerOctave: 'Slope an octave', power: 'Power of frequency', residualDb: 'Residual, rms',
  phaseMarginDeg: 'Phase margin', gainCrossoverHz: 'Gain crossover', gainMarginDb: 'Gain margin, up', gainReductionDb: 'Gain margin, down', phaseCrossoverHz: 'Phase crossover',
  leastDistance: 'Least distance', leastDistanceHz: 'Least distance at', inverted: 'Inverted',
});

/** A name of the API in words; one that is not known is taken apart. @param {string} name */
export function nameOf(name) {
  const known = words[name];
  if (known !== undefined)
    return known;
  const apart = name.replace(/(Hz|Db|Deg|Seconds)$/, '').replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
  return apart[0].toUpperCase() + apart.slice(1);
}

/** The unit of a parameter, by its name. @param {string} name */
export function unitOf(name) {
  return /Hz$/.test(name) ? 'Hz' : /Db$/.test(name) ? 'dB' : /Deg$/.test(name) ? 'deg' : /Seconds$/.test(name) ? 's' : '';
}

/** @param {unknown} value @param {string} name */
function valueText(value, name) {
  const unit = unitOf(name);
  return unit === 'Hz' ? frequency(Number(value)) : quantity(Number(value), unit);
}

/** What a reference level is taken from. @param {any} reference */
export function referenceWords(reference) {
  switch (reference?.kind) {
    case 'peak': return 'from the peak';
    case 'frequency': return `from the level at ${frequency(reference.frequencyHz)}`;
    case 'band': return `from the mean of ${frequency(reference.fromHz)} to ${frequency(reference.toHz)}`;
    default: return '';
  }
}

/** A call in words: "Bandwidth, drop 3.00 dB, from the peak". @param {MeasureCall} call */
export function callWords({ measure, parameters }) {
  const numbers = Object.entries(parameters).filter(([name]) => name !== 'reference').map(([name, value]) => `${nameOf(name).toLowerCase()} ${valueText(value, name)}`);
  return [nameOf(measure), ...numbers, ...(parameters.reference === undefined ? [] : [referenceWords(parameters.reference)])].join(', ');
}

/**
 * The call that a form asks for, or what is wrong with its fields. A parameter that may be left out and is, is left out.
 * @param {Measure} measure
 * @param {(name: string) => string} typed   the text of a field
 * @returns {{ call: MeasureCall, errors: null } | { call: null, errors: Record<string, string> }}
 */
export function callOf(measure, typed) {
  /** @type {Record<string, unknown>} */
  const parameters = {};
  /** @type {Record<string, string>} */
  const errors = {};
  const take = (/** @type {string} */ field, /** @type {string} */ name, /** @type {boolean} */ required) => {
    const text = typed(field).trim();
    if (text === '' && !required)
      return undefined;
    const { value, problem } = parseNumber(text, unitOf(name));
    if (value === null)
      errors[field] = problem;
    return value ?? undefined;
  };

  for (const { name, required } of measure.parameters) {
    const value = take(name, name, required);
    if (value !== undefined)
      parameters[name] = value;
  }

  if (measure.takesReference) {
    const kind = typed('kind') || 'peak';
    const members = kind === 'frequency' ? ['frequencyHz'] : kind === 'band' ? ['fromHz', 'toHz'] : [];
    const entries = members.map((member) => [member, take(`reference.${member}`, member, true)]);
    parameters.reference = { kind, ...Object.fromEntries(entries) };
  }

  return Object.keys(errors).length > 0 ? { call: null, errors } : { call: { measure: measure.name, parameters }, errors: null };
}

/**
 * The outputs of a result with their units, in the order of the catalogue.
 * @param {any} result
 * @param {Measure | undefined} measure
 * @returns {{ name: string, text: string, value: number | null, unit: string }[]}
 */
export function outputsOf(result, measure) {
  const outputs = measure?.outputs ?? Object.keys(result.outputs).map((name) => ({ name, unit: unitOf(name) }));
  return outputs.map(({ name, unit }) => ({ name: nameOf(name), value: result.outputs[name] ?? null, unit, text: outputText(result.outputs[name], unit) }));
}

/** @param {number | boolean | null | undefined} value @param {string} unit */
function outputText(value, unit) {
  if (typeof value === 'boolean')
    return value ? 'yes' : 'no';
  return value === null || value === undefined ? absent : unit === 'Hz' ? frequency(value, 5) : quantity(value, unit);
}
