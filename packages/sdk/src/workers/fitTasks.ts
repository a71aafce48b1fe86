import { agesOf, redistributed, type DrawAges } from '../fit/evaluator.js';
import { FitModel, type Evaluation } from '../fit/model.js';
import { checkProblem, type FitProblem } from '../fit/problem.js';
import { addTask } from './tasks.js';

/** The models that this worker was last prepared with, one for each alternative, by a number that the caller chose. */
const prepared: { id: number; models: FitModel[] } = { id: -1, models: [] };

addTask('fitPrepare', (payload) => {
  const { id, problem } = payload as { id: number; problem: FitProblem };
  const checked = checkProblem(problem);
  prepared.models = checked.alternatives.map((_alternative, k) => new FitModel(checked, k));
  prepared.id = id;
  return true;
});

function modelOf({ id, alternative }: { id: number; alternative: number }): FitModel {
  if (prepared.id !== id) throw new Error('This worker was prepared for another fit.');
  return prepared.models[alternative];
}

addTask('fitEvaluate', (payload): Evaluation[] => {
  const call = payload as { id: number; alternative: number; points: number[][] };
  const model = modelOf(call);
  return call.points.map((point) => model.evaluate(point));
});

addTask('fitRedistribute', (payload): Float64Array[] => {
  const call = payload as { id: number; alternative: number; point: number[]; seeds: number[] };
  const model = modelOf(call);
  return call.seeds.map((seed) => redistributed(model, call.point, seed));
});

addTask('fitAges', (payload): DrawAges[] => {
  const call = payload as { id: number; alternative: number; points: number[][]; limits: number[] };
  const model = modelOf(call);
  return call.points.map((point) => agesOf(model, point, call.limits));
});
