import { DropdownMenu } from '@radix-ui/themes';
import { Link } from 'react-router-dom';
import { THEME_CHOICES, type ThemeChoice, useTheme } from '@/lib/theme';

const THEME_WORDS: Record<ThemeChoice, string> = { light: 'Light', dark: 'Dark', system: 'As the system' };

export interface ShellPerson {
  displayName: string;
  roles: readonly string[];
}

export interface WhoMenuProps {
  person: ShellPerson;
  onKeys: () => void;
  onSignOut: () => void;
}

/** Who is here; opens what belongs to the person. */
export function WhoMenu({ person, onKeys, onSignOut }: WhoMenuProps) {
  const { choice, setChoice } = useTheme();
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger>
        <button type="button" className="bl-who">
          <strong>{person.displayName}</strong>
          <span>{person.roles.join(', ')}</span>
        </button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Content align="start" side="top">
        <DropdownMenu.Item asChild>
          <Link to="/account">Your account</Link>
        </DropdownMenu.Item>
        <DropdownMenu.Item onSelect={onKeys} shortcut="?">
          Keys
        </DropdownMenu.Item>
        <DropdownMenu.Separator />
        <DropdownMenu.Label>Paper</DropdownMenu.Label>
        <DropdownMenu.RadioGroup
          value={choice}
          onValueChange={(value) => setChoice(THEME_CHOICES.find((known) => known === value) ?? 'system')}
        >
          {THEME_CHOICES.map((known) => (
            <DropdownMenu.RadioItem key={known} value={known}>
              {THEME_WORDS[known]}
            </DropdownMenu.RadioItem>
          ))}
        </DropdownMenu.RadioGroup>
        <DropdownMenu.Separator />
        <DropdownMenu.Item onSelect={onSignOut}>Sign out</DropdownMenu.Item>
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}

/** One word that changes the paper at once. */
export function PaperWord() {
  const { appearance, setChoice } = useTheme();
  const other = appearance === 'dark' ? 'light' : 'dark';
  return (
    <button type="button" className="bl-word" onClick={() => setChoice(other)}>
      {THEME_WORDS[other]}
    </button>
  );
}
