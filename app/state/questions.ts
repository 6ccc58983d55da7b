import { createStore } from 'zustand/vanilla';

/** A question that only the user can answer, with its possible answers. */
export interface Question {
  readonly title: string;
  readonly text: string;
  readonly choices: readonly { readonly id: string; readonly text: string }[];
  readonly answer: (id: string | null) => void;
}

export const questionsStore = createStore<{ readonly waiting: readonly Question[] }>()(() => ({ waiting: [] }));

/** Asks the user; null if the question was put aside. Questions are asked one after the other. */
export function ask(title: string, text: string, choices: Question['choices']): Promise<string | null> {
  return new Promise((resolve) => {
    const question: Question = {
      title,
      text,
      choices,
      answer: (id) => {
        questionsStore.setState(({ waiting }) => ({ waiting: waiting.filter((q) => q !== question) }));
        resolve(id);
      },
    };
    questionsStore.setState(({ waiting }) => ({ waiting: [...waiting, question] }));
  });
}
