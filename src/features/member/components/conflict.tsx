import { clockTime } from '@/lib/time';
import { Button } from '@/components/ui/button';
import { Message } from '@/components/ui/states';
import { Cell, HeadCell, Table } from '@/components/ui/table';
import { differences, valueAt } from '../model/draft-document';
import { useEditor } from '../model/editor';
import { wordsForPath, wordsForValue } from '../model/words';

const MOST = 12;

/** Somebody else saved first: who, when, what differs, and the choice whose document holds. */
export function Conflict() {
  const { save, document, keepMine, takeTheirs } = useEditor();
  if (save.state.kind !== 'conflict') return null;
  const { theirs } = save.state;
  const paths = differences(document, theirs.document);
  const who = theirs.saved.by?.name ?? 'Somebody else';
  return (
    <Message tone="crayon" role="alert" className="mb-4">
      <p>
        <strong className="text-crayon font-semibold">
          {who} saved this member at {clockTime(theirs.saved.at)}, while you were changing it.
        </strong>{' '}
        Nothing of yours is saved until you choose; whichever you take, Undo brings the other back.
      </p>
      {paths.length > 0 && (
        <div className="bg-sheet border-line my-3 rounded border px-2">
          <Table label="What differs">
            <thead>
              <tr>
                <HeadCell>What differs</HeadCell>
                <HeadCell>Yours</HeadCell>
                <HeadCell>Theirs</HeadCell>
              </tr>
            </thead>
            <tbody>
              {paths.slice(0, MOST).map((path) => (
                <tr key={path}>
                  <Cell>{wordsForPath(document, path)}</Cell>
                  <Cell>{wordsForValue(valueAt(document, path))}</Cell>
                  <Cell>{wordsForValue(valueAt(theirs.document, path))}</Cell>
                </tr>
              ))}
            </tbody>
          </Table>
          {paths.length > MOST && <p className="text-small px-2.5 py-2">and {paths.length - MOST} more</p>}
        </div>
      )}
      <div className="mt-3 flex flex-wrap gap-2">
        <Button look="main" onClick={keepMine}>
          Keep mine, save over theirs
        </Button>
        <Button onClick={takeTheirs}>Take theirs</Button>
      </div>
    </Message>
  );
}
