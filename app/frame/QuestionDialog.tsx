import { useEffect, useRef } from 'react';
import { useStore } from 'zustand';
import { type Question, questionsStore } from '../state/questions.ts';

function Asked({ question }: { question: Question }) {
  const dialog = useRef<HTMLDialogElement>(null);
  const answered = useRef(false);
  useEffect(() => dialog.current?.showModal(), []);
  const answer = (id: string | null) => {
    if (answered.current) return;
    answered.current = true;
    question.answer(id);
  };
  return (
    <dialog ref={dialog} aria-labelledby="question-title" onClose={() => answer(null)}>
      <h2 id="question-title">{question.title}</h2>
      <p className="question-text">{question.text}</p>
      <ul className="question-choices">
        {question.choices.map(({ id, text }) => (
          <li key={id}>
            <button type="button" onClick={() => answer(id)}>
              {text}
            </button>
          </li>
        ))}
      </ul>
      <div className="dialog-foot">
        <button type="button" className="plain" onClick={() => answer(null)}>
          None of these
        </button>
      </div>
    </dialog>
  );
}

/** The question in front, if there is one. */
export function QuestionDialog() {
  const question = useStore(questionsStore, (s) => s.waiting[0]);
  return question === undefined ? null : <Asked key={question.title + question.text} question={question} />;
}
