import { FitModel, type Evaluation } from '../fit/model.js';
import { checkProblem, type FitProblem } from '../fit/problem.js';
import { addTask } from './tasks.js';

/** The model that this worker was last prepared with, by a number that the caller chose. */
const prepared: { id: number; model: FitModel | null } = { id: -1, model: null };

addTask('fitPrepare', (payload) => {
  const { id, problem } = payload as { id: number; problem: FitProblem };
  prepared.model = new FitModel(checkProblem(problem));
  prepared.id = id;
  return true;
});

addTask('fitEvaluate', (payload): Evaluation[] => {
  const { id, points } = payload as { id: number; points: number[][] };
  if (prepared.model === null || prepared.id !== id) throw new Error('This worker was prepared for another fit.');
  const { model } = prepared;
  return points.map((point) => model.evaluate(point));
});
