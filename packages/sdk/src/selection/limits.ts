import { piece, type FormDefinition } from './form.js';

/** All of the outflow is taken from the youngest water there is. */
export const youngestFirst: FormDefinition = {
  form: 'youngestFirst',
  fields: [],
  compile: (_data, _path, _amounts, weights) => [piece(weights, { limit: 'youngest' })],
};

/** All of the outflow is taken from the oldest water there is: piston flow. */
export const oldestFirst: FormDefinition = {
  form: 'oldestFirst',
  fields: [],
  compile: (_data, _path, _amounts, weights) => [piece(weights, { limit: 'oldest' })],
};
