import { type ReactNode, useState } from 'react';
import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { sentenceOf } from '../app/problem.ts';
import { words } from '../words/en.ts';
import { Button } from './button.tsx';

type DialogProps = {
  open: boolean;
  onClose: () => void;
  /** The act. */
  heading: string;
  /** What happens, and what can't be undone. */
  what: ReactNode;
  children?: ReactNode;
  /** The label of the act; says what will happen. */
  act: string;
  onAct: () => Promise<unknown> | unknown;
  /** Closed while the fields do not allow the act. */
  ready?: boolean;
  /** Where there is nothing to go back from. */
  noCancel?: boolean;
};

/** Only for what can't be undone or is signed. It closes when the act is done and stays when it is refused. */
export function Dialog(props: DialogProps) {
  const [working, setWorking] = useState(false);
  const [problem, setProblem] = useState<string>();

  async function run() {
    setWorking(true);
    setProblem(undefined);
    try {
      await props.onAct();
      props.onClose();
    } catch (error) {
      setProblem(sentenceOf(error));
    } finally {
      setWorking(false);
    }
  }

  return (
    <ModalOverlay
      isOpen={props.open}
      onOpenChange={(open) => {
        if (open || working) return;
        setProblem(undefined);
        props.onClose();
      }}
      className="fixed inset-0 z-20 overflow-y-auto bg-ink/45 p-4"
    >
      <Modal className="mx-auto mt-[8dvh] w-full max-w-dialog rounded-3 border border-edge bg-panel">
        <AriaDialog className="p-6 outline-none" role="alertdialog">
          <form
            noValidate
            onSubmit={(event) => {
              event.preventDefault();
              if (props.ready !== false && !working) void run();
            }}
          >
            <Heading slot="title" className="text-21 font-semibold">
              {props.heading}
            </Heading>
            <div className="mt-2 grid gap-2">{props.what}</div>
            {problem ? (
              <p role="alert" className="mt-4 border-l-4 border-stop py-1 pl-3 text-stop">
                {problem}
              </p>
            ) : null}
            {props.children ? <div className="mt-4 grid gap-4">{props.children}</div> : null}
            <div className="mt-6 flex flex-wrap gap-3">
              <Button type="submit" weight="filled" isDisabled={working || props.ready === false}>
                {props.act}
              </Button>
              {props.noCancel ? null : (
                <Button onPress={props.onClose} isDisabled={working}>
                  {words.common.cancel}
                </Button>
              )}
            </div>
          </form>
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  );
}
