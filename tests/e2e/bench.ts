import { expect, type Page } from '@playwright/test';

/** What the specs do at the bench, in words. */
export class Bench {
  constructor(readonly page: Page) {}

  get findings() {
    return this.page.getByRole('complementary', { name: 'Findings' });
  }

  get strip() {
    return this.page.getByRole('region', { name: 'Range strip' });
  }

  async addPopulation(name: string): Promise<void> {
    await this.page.getByRole('textbox', { name: 'Name of the population' }).fill(name);
    await this.page.getByRole('button', { name: 'Add', exact: true }).click();
  }

  async addFromTemplate(
    template: string,
    fill: (dialog: ReturnType<Page['getByRole']>) => Promise<void>,
  ): Promise<void> {
    await this.page.getByRole('button', { name: 'Add process' }).first().click();
    await this.page.getByRole('menuitem', { name: template }).click();
    const dialog = this.page.getByRole('dialog', { name: template });
    await fill(dialog);
    await expect(dialog.getByRole('region', { name: 'Preview', exact: true })).toBeVisible();
    await dialog.getByRole('button', { name: 'Add', exact: true }).click();
    await expect(dialog).toBeHidden();
  }

  async setNumber(label: string | RegExp, value: string): Promise<void> {
    const field = this.page.getByRole('textbox', { name: label }).first();
    await field.fill(value);
    await field.press('Enter');
  }

  async chooseSwept(search: string): Promise<void> {
    await this.strip.getByRole('button', { name: /Choose a parameter/ }).click();
    const chooser = this.page.getByRole('dialog');
    await chooser.getByRole('combobox').fill(search);
    await chooser.getByRole('option').first().click();
  }

  async sweep(from: string, to: string): Promise<void> {
    for (const [label, value] of [
      ['from', from],
      ['to', to],
    ] as const) {
      const field = this.strip.getByRole('textbox', { name: label, exact: true });
      await field.fill(value);
      await field.press('Enter');
    }
    await this.strip.getByRole('button', { name: 'Run the sweep' }).click();
  }

  async save(note: string): Promise<void> {
    await this.page.getByRole('button', { name: 'Save version' }).click();
    const dialog = this.page.getByRole('dialog');
    await dialog.getByRole('textbox', { name: 'Note' }).fill(note);
    await dialog.getByRole('button', { name: /^Save/ }).click();
    await expect(dialog).toBeHidden();
  }
}
