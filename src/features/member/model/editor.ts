import { zodResolver } from '@hookform/resolvers/zod';
import { useQueryClient } from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useState,
  useSyncExternalStore,
} from 'react';
import { useForm } from 'react-hook-form';
import type { UseFormReturn } from 'react-hook-form';
import { z } from 'zod';
import type { Member } from '@shared/schemas/api';
import { memberDocumentSchema } from '@shared/schemas/member';
import { queryKeys } from '@/lib/query-client';
import { fetchCurrentMember, saveDraft } from '../api/member';
import { sameJson, withValueAt } from './draft-document';
import type { DraftDocument } from './draft-document';
import { DraftSaver } from './draft-saver';
import type { SaverSnapshot } from './draft-saver';
import { remember, stepBack } from './history';
import type { History } from './history';
import { keepUnsaved, keptUnsaved } from './unsaved';

/** The form takes anything that may stand in a draft; what is right is for the schema that the server uses, too. */
const resolver = zodResolver(z.preprocess((draft: DraftDocument) => draft, memberDocumentSchema));

/** One member's document in the making: the form, what is saved of it, and the way back. */
export interface Editor {
  member: Member;
  readOnly: boolean;
  form: UseFormReturn<DraftDocument>;
  save: SaverSnapshot;
  /** the document as it stands on the screen */
  document: DraftDocument;
  /** changes one field */
  set: (path: string, value: unknown) => void;
  /** puts a whole document in place of this one, as one step that can be undone */
  replace: (document: DraftDocument) => void;
  canUndo: boolean;
  undo: () => void;
  keepMine: () => void;
  takeTheirs: () => void;
  retry: () => void;
}

const EditorContext = createContext<Editor | null>(null);
export const EditorProvider = EditorContext.Provider;

/** The editor of the member whose page this is. */
export function useEditor(): Editor {
  const editor = useContext(EditorContext);
  if (editor === null) throw new Error('useEditor belongs inside a member’s page');
  return editor;
}

const createSaver = (member: Member, client: QueryClient): DraftSaver =>
  new DraftSaver(member, {
    put: async (document, version, signal) => {
      const answer = await saveDraft(member.id, document, version, signal);
      void client.invalidateQueries({ queryKey: queryKeys.members(member.projectId) });
      void client.invalidateQueries({ queryKey: queryKeys.projects });
      return answer;
    },
    current: () => fetchCurrentMember(member.id),
    keep: (unsaved) => keepUnsaved(member.id, unsaved),
    now: () => Date.now(),
  });

/** Sets up editing for a member that has just been loaded. */
export function useMemberEditor(member: Member): Editor {
  const client = useQueryClient();
  const [saver] = useState(() => createSaver(member, client));
  const [kept] = useState(() => {
    const unsaved = member.may.edit ? keptUnsaved(member.id) : null;
    return unsaved !== null && !sameJson(unsaved.document, member.document) ? unsaved : null;
  });
  const [document, setDocument] = useState<DraftDocument>(kept?.document ?? member.document);
  const [history, setHistory] = useState<History>([]);
  const save = useSyncExternalStore(saver.subscribe, saver.snapshot);
  const form = useForm<DraftDocument>({ defaultValues: document, resolver, mode: 'onChange' });

  useEffect(() => {
    if (kept !== null) saver.resume(kept.document, kept.version);
    void form.trigger();
    return () => saver.leave();
  }, [saver, kept, form]);

  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (saver.unsaved) event.preventDefault();
    };
    const again = () => saver.flush();
    window.addEventListener('beforeunload', warn);
    window.addEventListener('online', again);
    return () => {
      window.removeEventListener('beforeunload', warn);
      window.removeEventListener('online', again);
    };
  }, [saver]);

  const show = useCallback(
    (next: DraftDocument) => {
      setDocument(next);
      form.reset(next);
      void form.trigger();
    },
    [form],
  );

  return useMemo<Editor>(
    () => ({
      member,
      readOnly: !member.may.edit,
      form,
      save,
      document,
      set: (path, value) => {
        form.setValue(path, value, { shouldDirty: true });
        void form.trigger();
        const next = withValueAt(document, path, value);
        setHistory(remember(history, document, path, Date.now()));
        setDocument(next);
        saver.change(next);
      },
      replace: (next) => {
        setHistory(remember(history, document, '', Date.now()));
        show(next);
        saver.change(next);
      },
      canUndo: history.length > 0,
      undo: () => {
        const back = stepBack(history);
        if (back === null) return;
        setHistory(back.history);
        show(back.document);
        saver.change(back.document);
      },
      keepMine: () => {
        if (save.state.kind === 'conflict')
          setHistory([...history, { before: save.state.theirs.document, path: '', at: Date.now() }]);
        saver.keepMine();
      },
      takeTheirs: () => {
        const theirs = saver.takeTheirs();
        if (theirs === null) return;
        setHistory(remember(history, document, '', Date.now()));
        show(theirs);
      },
      retry: () => saver.flush(),
    }),
    [member, form, save, document, history, saver, show],
  );
}
