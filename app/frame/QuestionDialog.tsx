import { type ReactNode, useEffect, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { type ManyQuestion, type Question, questionsStore } from '../state/questions.ts';

/** The frame of a question: title, words, its answers, and a way to leave it open. */
function Asked({
  question,
  leave,
  children,
  foot,
}: {
  question: { readonly title: string; readonly text: string };
  leave: () => void;
  children: ReactNode;
  foot?: ReactNode;
}) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => dialog.current?.showModal(), []);
  return (
    <dialog ref={dialog} aria-labelledby="question-title" onClose={leave}>
      <h2 id="question-title">{question.title}</h2>
      <p className="question-text">{question.text}</p>
      {children}
      <div className="dialog-foot">
        <button type="button" className="plain" onClick={leave}>
          None of these
        </button>
        {foot}
      </div>
    </dialog>
  );
}

/** One answer: a press chooses it. */
function AskedOne({ question }: { question: Question }) {
  const answered = useRef(false);
  const answer = (id: string | null) => {
    if (answered.current) return;
    answered.current = true;
    question.answer(id);
  };
  return (
    <Asked question={question} leave={() => answer(null)}>
      <ul className="question-choices">
        {question.choices.map(({ id, text }) => (
          <li key={id}>
            <button type="button" onClick={() => answer(id)}>
              {text}
            </button>
          </li>
        ))}
      </ul>
    </Asked>
  );
}

/** Any number of answers: boxes to tick, and a button. */
function AskedMany({ question }: { question: ManyQuestion }) {
  const [chosen, setChosen] = useState<ReadonlySet<string>>(
    () => new Set(question.choices.filter((c) => c.chosen).map((c) => c.id)),
  );
  const answered = useRef(false);
  const answer = (ids: readonly string[] | null) => {
    if (answered.current) return;
    answered.current = true;
    question.answerMany(ids);
  };
  const toggle = (id: string) =>
    setChosen((now) => {
      const next = new Set(now);
      if (!next.delete(id)) next.add(id);
      return next;
    });
  const inOrder = () => question.choices.filter((c) => chosen.has(c.id)).map((c) => c.id);
  return (
    <Asked
      question={question}
      leave={() => answer(null)}
      foot={
        <button type="button" className="lead" disabled={chosen.size === 0} onClick={() => answer(inOrder())}>
          {question.confirm}
        </button>
      }
    >
      <ul className="question-boxes">
        {question.choices.map(({ id, text }) => (
          <li key={id}>
            <label>
              <input type="checkbox" checked={chosen.has(id)} onChange={() => toggle(id)} /> {text}
            </label>
          </li>
        ))}
      </ul>
    </Asked>
  );
}

/** The question in front, if there is one. */
export function QuestionDialog() {
  const question = useStore(questionsStore, (s) => s.waiting[0]);
  if (question === undefined) return null;
  const key = question.title + question.text;
  return 'answerMany' in question ? (
    <AskedMany key={key} question={question} />
  ) : (
    <AskedOne key={key} question={question} />
  );
}
