import { expose, releaseProxy } from 'comlink';
import { Desk } from './desk.ts';

/** A desk on a thread of its own. The lock under the worker's name is let go by the browser when the worker dies, however it dies. */
class ThreadDesk extends Desk {
  override ready(): Promise<void> {
    if (navigator.locks === undefined) return Promise.resolve();
    return new Promise((held) => {
      void navigator.locks.request(self.name, () => {
        held();
        return new Promise<never>(() => {});
      });
    });
  }

  override async run(...[operation, ask, supply, stop, hear]: Parameters<Desk['run']>) {
    try {
      return await super.run(operation, ask, supply, stop, hear);
    } finally {
      (hear as unknown as { [releaseProxy]?: () => void })[releaseProxy]?.();
    }
  }
}

expose(new ThreadDesk());
