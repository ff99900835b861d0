import { firstStart, type BenchModel } from './bench-model';

/** Least of each job alone, on empty channels: a weighted tardiness and a makespan that no plan of all jobs goes under, s. */
export function eachAlone(model: BenchModel): { lateS: number; makespanS: number } {
  let [lateS, makespanS] = [0, 0];
  for (let job = 0; job < model.source.length; job += 1) {
    let [late, end] = [Infinity, Infinity];
    for (let way = model.firstAlternative[job]!; way < model.firstAlternative[job + 1]!; way += 1) {
      const start = firstStart(model, way, 0);
      late = Math.min(late, Math.max(0, start + model.guard[way]! - model.due[job]!));
      end = Math.min(end, start + model.ready[way]!);
    }
    lateS += model.weight[job]! * late;
    makespanS = Math.max(makespanS, end);
  }
  return { lateS, makespanS };
}
