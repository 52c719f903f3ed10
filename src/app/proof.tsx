import { useEffect, useSyncExternalStore } from 'react';
import type { ComponentType } from 'react';
import { loadWords } from '#src/lib/i18n.ts';
import { Unreachable } from '#src/lib/problem.ts';
import { createSignal } from '#src/lib/signal.ts';
import type { ProofDialogProps } from './ProofDialog.tsx';
import { isProofNeeded } from './proof-needed.ts';

type Shown = ProofDialogProps & { Dialog: ComponentType<ProofDialogProps> };

/** One question at a time in a tab, however many acts wait for its answer. */
let shown: Shown | null = null;
let answered: Promise<boolean> | null = null;
let hosts = 0;
const changed = createSignal<void>();

async function loadDialog() {
  try {
    const [module] = await Promise.all([import('./ProofDialog.tsx'), loadWords(['accounts'])]);
    return module.ProofDialog;
  } catch (error) {
    throw new Unreachable(error);
  }
}

async function ask(): Promise<boolean> {
  const Dialog = await loadDialog();
  // Where nothing shows the question nobody can answer it, and the act stays refused.
  if (hosts === 0) return false;
  answered ??= new Promise((resolve) => {
    const onAnswer = (proven: boolean) => {
      shown = null;
      answered = null;
      changed.emit();
      resolve(proven);
    };
    shown = { Dialog, onAnswer };
    changed.emit();
  });
  return answered;
}

async function withProof<T>(act: () => Promise<T>): Promise<T> {
  try {
    return await act();
  } catch (error) {
    if (!isProofNeeded(error) || !(await ask())) throw error;
    return act();
  }
}

/**
 * For acts that need a fresh proof of who acts. `withProof` runs the act; where the server asks for a proof it
 * shows the dialog over the page, which stays as it is, and runs the act again. Whoever closes the dialog gets
 * the server's refusal (`isProofNeeded`), and nothing has changed.
 */
export const useProven = (): typeof withProof => withProof;

/** Shows the question. It stands wherever somebody is signed in, and takes the question away with the session. */
export function ProofHost() {
  const question = useSyncExternalStore(changed.subscribe, () => shown);
  useEffect(() => {
    hosts += 1;
    return () => {
      hosts -= 1;
      if (hosts === 0) shown?.onAnswer(false);
    };
  }, []);
  return question ? <question.Dialog onAnswer={question.onAnswer} /> : null;
}
