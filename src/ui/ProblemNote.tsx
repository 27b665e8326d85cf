import { CallError } from '../api/call-error.ts';
import { Button } from './Button.tsx';

/** A refusal or failure in a sentence, with what can be done about it. */
export function ProblemNote({ error, onRetry }: { readonly error: Error; readonly onRetry?: () => void }) {
  const problem = error instanceof CallError ? error.problem : null;
  const details = Object.entries(problem?.fields ?? {}).filter(([, sentence]) => !problem?.sentence.includes(sentence));
  return (
    <div role="alert" className="my-3 grid justify-items-start gap-2 border-2 border-bad bg-surface p-3 text-sm">
      <p className="font-semibold">
        {error instanceof CallError ? error.message : 'Something went wrong on this page. Reload it and try again.'}
      </p>
      {problem?.reasons && (
        <ul className="list-disc pl-5">
          {problem.reasons.map((reason) => (
            <li key={`${reason.subject.id} ${reason.sentence}`}>{reason.sentence}</li>
          ))}
        </ul>
      )}
      {details.length > 0 && (
        <ul className="list-disc pl-5">
          {details.map(([field, sentence]) => (
            <li key={field}>
              {field.startsWith('row') && <strong>{field}: </strong>}
              {sentence}
            </li>
          ))}
        </ul>
      )}
      {onRetry && (
        <Button variant="plain" onClick={onRetry}>
          Try again
        </Button>
      )}
    </div>
  );
}
