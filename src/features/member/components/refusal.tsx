import { clockTime } from '@/lib/time';
import { Message } from '@/components/ui/states';
import { useEditor } from '../model/editor';
import { wordsForPath } from '../model/words';

/** Why the document on the screen could not be calculated, place by place, and of when the figures below are. */
export function Refusal() {
  const { save, document } = useEditor();
  const { answer, good } = save;
  if (answer.result !== null) return null;
  const [first, ...others] = answer.issues;
  const headline = answer.refusal ?? first?.message ?? 'The document cannot be calculated.';
  const listed =
    first !== undefined && others.length === 0 && first.message === headline ? [] : answer.issues;
  return (
    <Message tone="crayon" role="alert" className="mb-4">
      <p>
        <strong className="text-crayon font-semibold">{headline}</strong>{' '}
        {good === null ? (
          <span className="text-ink2">There are no figures until this is mended.</span>
        ) : (
          <span className="text-ink2">
            The figures are those of {clockTime(good.saved.at)}, before this change.
          </span>
        )}
      </p>
      {listed.length > 0 && (
        <ul className="mt-2 list-disc pl-5">
          {listed.slice(0, 12).map((issue) => (
            <li key={`${issue.path} ${issue.message}`}>
              {issue.path !== '' && <span className="text-ink2">{wordsForPath(document, issue.path)}: </span>}
              {issue.message}
            </li>
          ))}
          {listed.length > 12 && <li>and {listed.length - 12} more</li>}
        </ul>
      )}
    </Message>
  );
}
