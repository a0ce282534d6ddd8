import type { OccupationError } from '../errors/index.js';
import { type Component, type ErrorModel, fitErrorModel, fitWithoutEachDay } from '../fit/index.js';
import { InputError, type Message, message } from '../logs/index.js';
import type { FitResult } from './results.js';
import type { Study } from './study.js';

const COMPONENTS: readonly Component[] = ['horizontal', 'vertical'];

/** Fits each component that the errors hold; a component that cannot be fitted leaves a message. */
export function fitComponents(
  errors: readonly OccupationError[],
  { confidence }: Study,
): { models: ErrorModel[]; messages: Message[] } {
  if (errors.length === 0) {
    return {
      models: [],
      messages: [
        message(
          'error',
          'no-occupations',
          'No occupation is left to fit: no row is fixed and on a known mark. The account above says what became of the rows.',
        ),
      ],
    };
  }
  const models: ErrorModel[] = [];
  const messages: Message[] = [];
  for (const component of COMPONENTS) {
    try {
      const model = fitErrorModel(errors, { component, confidence });
      models.push(model);
      messages.push(...model.notes.map((note) => ({ ...note, text: `${title(component)}: ${note.text}` })));
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      messages.push(...error.messages);
    }
  }
  return { models, messages };
}

const title = (component: Component): string => (component === 'horizontal' ? 'Horizontal' : 'Vertical');

/** A model as the results state it. */
export function fitResult(model: ErrorModel, errors: readonly OccupationError[]): FitResult {
  const { component, reference, form, screened, basis, confidence, constantMm, ppm, ppmIfIndependent } =
    model;
  const { interval, informationNumber, occupations, days, marks, shortestKm, longestKm, notes } = model;
  return {
    component,
    reference,
    composed: false,
    form,
    screened,
    basisOfRule: true,
    basis,
    confidence,
    constantMm,
    ppm,
    ppmIfIndependent,
    interval,
    informationNumber,
    occupations,
    days,
    marks,
    shortestKm,
    longestKm,
    mostInfluentialDay: mostInfluentialDay(model, errors),
    notes: notes.map(({ text }) => text),
  };
}

function mostInfluentialDay(
  { component, uncertainty, ppm }: ErrorModel,
  errors: readonly OccupationError[],
): FitResult['mostInfluentialDay'] {
  if (uncertainty === null || ppm.estimate === null) return null;
  let most: FitResult['mostInfluentialDay'] = null;
  const change = (without: number): number => Math.abs(without - ppm.estimate!);
  for (const { day, ppm: without } of fitWithoutEachDay(errors, { component })) {
    if (without !== null && (most === null || change(without) > change(most.ppmWithout))) {
      most = { day, ppmWithout: without };
    }
  }
  return most;
}
