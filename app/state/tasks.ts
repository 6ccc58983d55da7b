import type { Task } from '../workers/pool.ts';

/** The running tasks of each sheet, so that they can be stopped by name or all at once. */
const running = new Map<string, Map<string, Task<unknown>>>();

/** Follows a task until its reply; an older task of the same name is stopped first. */
export function follow(sheet: string, name: string, task: Task<unknown>): void {
  stopTask(sheet, name);
  const tasks = running.get(sheet) ?? new Map<string, Task<unknown>>();
  running.set(sheet, tasks);
  tasks.set(name, task);
  void task.reply.then(() => {
    if (tasks.get(name) === task) tasks.delete(name);
  });
}

export function stopTask(sheet: string, name: string): void {
  running.get(sheet)?.get(name)?.stop();
}

export function stopAll(sheet: string): void {
  for (const task of running.get(sheet)?.values() ?? []) task.stop();
  running.delete(sheet);
}
