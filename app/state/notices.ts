import { createStore } from 'zustand/vanilla';

/** A word to the user that is not tied to one place of the page. */
export interface Notice {
  readonly id: number;
  readonly text: string;
  /** spoken at once and kept until closed, or politely and for a while */
  readonly grave: boolean;
}

export const noticesStore = createStore<{ readonly notices: readonly Notice[]; readonly said: string }>()(() => ({
  notices: [],
  said: '',
}));

let made = 0;
const shownFor = 6000;

/** Shows a notice; a plain one goes by itself. */
export function notify(text: string, grave = false): void {
  const notice = { id: ++made, text, grave };
  noticesStore.setState(({ notices }) => ({ notices: [...notices, notice].slice(-4) }));
  if (!grave) setTimeout(() => dismiss(notice.id), shownFor);
}

export function dismiss(id: number): void {
  noticesStore.setState(({ notices }) => ({ notices: notices.filter((n) => n.id !== id) }));
}

/** Says something to screen readers only: progress at its quarters, rows that are finished. */
export function say(text: string): void {
  noticesStore.setState({ said: text });
}
