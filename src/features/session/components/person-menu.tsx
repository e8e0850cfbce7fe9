import type { Person, Theme } from '@shared/schemas/api';
import { Button } from '@/components/ui/button';
import { Popover } from '@/components/ui/popover';
import { Segmented } from '@/components/ui/segmented';
import { useChangeMe, useSignOut } from '../api/session';

const initials = (name: string): string => {
  const words = name.split(/\s+/).filter(Boolean);
  return (
    (words[0]?.charAt(0) ?? '') + (words.length > 1 ? (words.at(-1)?.charAt(0) ?? '') : '')
  ).toUpperCase();
};

const themes: readonly { value: Theme; label: string }[] = [
  { value: 'system', label: 'System' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
];

const unitChoices = [
  { value: 'metric', label: 'mm', name: 'mm, millimetres and newtons' },
  { value: 'us', label: 'ft-in', name: 'ft-in, feet, inches and pounds' },
] as const;

/** Switches the units in which everything is read and typed. */
export function UnitsSwitch({ person, className }: { person: Person; className?: string }) {
  const change = useChangeMe();
  return (
    <Segmented
      label="Units"
      value={person.units}
      options={unitChoices}
      onChange={(units) => change.mutate({ units })}
      {...(className === undefined ? {} : { className })}
    />
  );
}

/** Who is signed in, how they like the screen, and the way out. */
export function PersonMenu({ person }: { person: Person }) {
  const change = useChangeMe();
  const signOut = useSignOut();
  return (
    <Popover
      label={`${initials(person.name)}, ${person.name}, your settings`}
      trigger={initials(person.name)}
      triggerClass="border-line2 text-small hover:border-ink2 flex size-8 items-center justify-center rounded-full border font-semibold pointer-coarse:size-11"
    >
      <p className="font-semibold">{person.name}</p>
      <p className="text-small text-ink2 break-words">{person.email}</p>
      <p className="text-small text-ink2 mt-3 mb-1 font-medium">Theme</p>
      <Segmented
        label="Theme"
        value={person.theme}
        options={themes}
        onChange={(theme) => change.mutate({ theme })}
      />
      <div className="sm:hidden">
        <p className="text-small text-ink2 mt-3 mb-1 font-medium">Units</p>
        <UnitsSwitch person={person} />
      </div>
      <div className="border-line mt-4 border-t pt-3">
        <Button className="w-full" disabled={signOut.isPending} onClick={() => signOut.mutate()}>
          Sign out
        </Button>
      </div>
    </Popover>
  );
}
