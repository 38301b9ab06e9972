import { expect, test } from '@playwright/test';

test('the first page loads without an error or a breach of the content policy', async ({ page }) => {
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (['error', 'warning'].includes(message.type())) complaints.push(message.text());
  });
  page.on('pageerror', (error) => complaints.push(String(error)));
  page.on('requestfailed', (request) => complaints.push(`${request.url()} failed`));

  const response = await page.goto('/');
  await page.waitForLoadState('networkidle');

  expect(response?.status()).toBe(200);
  expect(response?.headers()['content-security-policy']).toContain("default-src 'self'");
  await expect(page).toHaveTitle(/Stepwell/);
  expect(complaints).toEqual([]);
});
