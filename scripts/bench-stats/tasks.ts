/** The table of what is timed: one line a group of tasks, R's side beside it in the .R file of the same name. */
import { modelTasks } from './models';
import { survivalTasks } from './survival';
import type { BenchTask } from './task';

export const tasks: readonly BenchTask[] = [...survivalTasks, ...modelTasks];
