import { screen } from '@testing-library/react';
import type { UserEvent } from '@testing-library/user-event';

/** Opens a select by its label and picks an option by what it shows, as a pointer would. */
export async function chooseOption(user: UserEvent, label: string | RegExp, option: string): Promise<void> {
  await user.click(screen.getByRole('combobox', { name: label }));
  await user.click(await screen.findByTitle(option));
}
