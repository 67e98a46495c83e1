import type { Page } from 'playwright-core';

/** Chooses in a list field of the forms, as a person does: open, type where one can, pick. */
export async function choose(page: Page, label: string, option: string): Promise<void> {
  const field = page.getByRole('combobox', { name: label });
  await field.click();
  if (await field.isEditable()) await field.fill(option);
  await page.getByTitle(option, { exact: true }).last().click();
}
