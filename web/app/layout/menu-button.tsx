import type { ReactNode } from 'react';
import { Button, Menu, MenuItem, MenuTrigger, Popover } from 'react-aria-components';

export type MenuEntry = { id: string; label: string; note?: string };

type MenuButtonProps = {
  label: ReactNode;
  /** Where the label alone does not say what the menu is. */
  accessibleName?: string;
  items: readonly MenuEntry[];
  onAction: (id: string) => void;
  className?: string;
};

/** A word that opens a short list of acts or places. */
export function MenuButton(props: MenuButtonProps) {
  return (
    <MenuTrigger>
      <Button
        aria-label={props.accessibleName}
        className={`target inline-flex min-h-9 max-w-full items-center gap-2 text-left ${props.className ?? ''}`}
      >
        {props.label}
        <svg aria-hidden="true" width="10" height="6" viewBox="0 0 10 6" className="shrink-0">
          <path d="M1 1l4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </svg>
      </Button>
      <Popover
        placement="bottom start"
        offset={4}
        className="max-w-[calc(100vw-16px)] rounded-3 border border-edge bg-panel text-15 text-ink"
      >
        <Menu className="py-1 outline-none" onAction={(key) => props.onAction(String(key))}>
          {props.items.map((item) => (
            <MenuItem
              key={item.id}
              id={item.id}
              textValue={item.label}
              className="target flex cursor-pointer flex-wrap items-center gap-x-3 px-4 py-1.5 outline-none data-[focused]:bg-kelp/15"
            >
              <span>{item.label}</span>
              {item.note ? <span className="text-13 text-faded">{item.note}</span> : null}
            </MenuItem>
          ))}
        </Menu>
      </Popover>
    </MenuTrigger>
  );
}
