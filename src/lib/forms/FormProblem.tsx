import { problemSentences } from './form-problem';

/** Why what was sent was refused, announced at once. Nothing while there is no error. */
export function FormProblem({ error }: { readonly error: unknown }) {
  return (
    <div role="alert" className="text-fault font-strong space-y-1">
      {error === null || error === undefined
        ? null
        : problemSentences(error).map((sentence) => <p key={sentence}>{sentence}</p>)}
    </div>
  );
}
