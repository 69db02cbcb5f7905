import { expect, type Browser, type Page } from '@playwright/test';

const PASSWORD = process.env.DEMO_PASSWORD ?? 'brackwater-demo';

export type Role = 'engineer' | 'approver' | 'technician' | 'admin';

/** A person at a browser of their own, who counts what they do beside typing. */
export class Person {
  interactions = 0;

  private constructor(readonly page: Page) {}

  static async at(browser: Browser, viewport = { width: 1440, height: 900 }): Promise<Person> {
    const context = await browser.newContext({ viewport });
    const page = await context.newPage();
    return new Person(page);
  }

  async signIn(role: Role, organisation = 'brackwater'): Promise<void> {
    await this.page.goto('/sign-in');
    await this.type('E-mail', `${role}@${organisation}.example`);
    await this.type('Password', PASSWORD);
    await this.press('Sign in');
    await expect(this.page.getByRole('heading', { level: 1, name: 'Board' })).toBeVisible();
  }

  /** Typing is not counted: a person moves on with the tabulator. */
  async type(label: string | RegExp, text: string): Promise<void> {
    await this.page.getByLabel(label, { exact: typeof label === 'string' }).fill(text);
  }

  async press(name: string | RegExp): Promise<void> {
    this.interactions += 1;
    await this.page.getByRole('button', { name, exact: typeof name === 'string' }).click();
  }

  async follow(name: string | RegExp): Promise<void> {
    this.interactions += 1;
    await this.page.getByRole('link', { name }).first().click();
  }

  async choose(label: string, option: string): Promise<void> {
    this.interactions += 1;
    await this.page.getByLabel(label, { exact: true }).selectOption({ label: option });
  }

  async pick(name: string): Promise<void> {
    this.interactions += 1;
    await this.page.getByRole('radio', { name, exact: true }).check({ force: true });
  }

  async tick(name: string | RegExp): Promise<void> {
    this.interactions += 1;
    await this.page.getByRole('checkbox', { name }).check();
  }
}
