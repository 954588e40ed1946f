import { findModel } from '@nightcone/models';
import { useEffect, useState } from 'react';
import { useLocation, useNavigate, useParams } from 'react-router-dom';
import { ButtonLink, TextButton } from '../../../components/button.tsx';
import { Page } from '../../../components/page.tsx';
import { Empty, Loading } from '../../../components/problem-note.tsx';
import { PasteDialog, type PastedQuestion } from './paste-dialog.tsx';
import { QuestionSheet } from './question-sheet.tsx';
import { dropDraft } from './use-draft.ts';
import { useQuestionSource } from './use-question-source.ts';

/** New question for one model. */
export function Component() {
  const { model: id = '' } = useParams();
  const model = findModel(id);
  if (!model)
    return (
      <Page title="New question">
        <Empty title="There is no such model" actions={<ButtonLink to="/question">Pick a model</ButtonLink>}>
          <p>
            <code>{id}</code> is not a model of the current program.
          </p>
        </Empty>
      </Page>
    );
  return <QuestionOf key={model.id} model={model} />;
}

function QuestionOf({ model }: { model: NonNullable<ReturnType<typeof findModel>> }) {
  const navigate = useNavigate();
  const location = useLocation();
  const [pasted, setPasted] = useState<PastedQuestion | null>(
    () => (location.state as { pasted?: PastedQuestion } | null)?.pasted ?? null,
  );
  const [pasting, setPasting] = useState(false);
  // the way back shall lead to what was typed since, not to the pasted text again
  useEffect(() => {
    if (location.state) void navigate(`${location.pathname}${location.search}`, { replace: true, state: null });
  }, [location, navigate]);
  const [afresh, setAfresh] = useState(0);
  const source = useQuestionSource(model, pasted, afresh);
  const startAfresh = () => {
    void dropDraft(model.id);
    setPasted(null);
    setAfresh(afresh + 1);
  };
  const take = (question: PastedQuestion) => {
    if (question.model === model.id) setPasted(question);
    else void navigate(`/question/${question.model}`, { state: { pasted: question } });
  };
  // another source is another form; the same source keeps what was typed
  const formKey = `${afresh} ${location.search} ${pasted ? JSON.stringify(pasted) : ''}`;
  return (
    <Page
      title={`New question: ${model.title}`}
      heading={model.title}
      lead={
        <>
          <span>
            {model.summary} <code>{model.id}</code>
          </span>
          {source.said ? <span>{source.said}</span> : null}
          {source.kept || pasted ? <TextButton onClick={startAfresh}>Start afresh</TextButton> : null}
          <TextButton onClick={() => setPasting(true)}>Paste a specification</TextButton>
        </>
      }
    >
      {source.problem ? (
        <p role="alert" className="mt-3 border-ink border-l-2 pl-3">
          {source.problem}
        </p>
      ) : null}
      {source.texts ? (
        <QuestionSheet key={formKey} model={model} first={source.texts} untouched={source.untouched} onPaste={take} />
      ) : (
        <Loading what="the question" />
      )}
      <PasteDialog open={pasting} onOpenChange={setPasting} onQuestion={take} />
    </Page>
  );
}
