import { createStore } from 'zustand/vanilla';

interface Asked {
  readonly title: string;
  readonly text: string;
}

/** A question that only the user can answer, with its possible answers. */
export interface Question extends Asked {
  readonly choices: readonly { readonly id: string; readonly text: string }[];
  readonly answer: (id: string | null) => void;
}

/** A question of which several answers may hold at once. */
export interface ManyQuestion extends Asked {
  readonly choices: readonly { readonly id: string; readonly text: string; readonly chosen: boolean }[];
  /** words on the button that answers */
  readonly confirm: string;
  readonly answerMany: (ids: readonly string[] | null) => void;
}

export const questionsStore = createStore<{ readonly waiting: readonly (Question | ManyQuestion)[] }>()(() => ({
  waiting: [],
}));

function enqueue(question: Question | ManyQuestion): void {
  questionsStore.setState(({ waiting }) => ({ waiting: [...waiting, question] }));
}

function settle(question: Question | ManyQuestion): void {
  questionsStore.setState(({ waiting }) => ({ waiting: waiting.filter((q) => q !== question) }));
}

/** Asks the user; null if the question was put aside. Questions are asked one after the other. */
export function ask(title: string, text: string, choices: Question['choices']): Promise<string | null> {
  return new Promise((resolve) => {
    const question: Question = {
      title,
      text,
      choices,
      answer: (id) => {
        settle(question);
        resolve(id);
      },
    };
    enqueue(question);
  });
}

/** Asks for any number of the choices; null if the question was put aside. */
export function askMany(
  title: string,
  text: string,
  choices: ManyQuestion['choices'],
  confirm: string,
): Promise<readonly string[] | null> {
  return new Promise((resolve) => {
    const question: ManyQuestion = {
      title,
      text,
      choices,
      confirm,
      answerMany: (ids) => {
        settle(question);
        resolve(ids);
      },
    };
    enqueue(question);
  });
}
