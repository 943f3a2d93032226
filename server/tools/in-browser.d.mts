import type { Page } from 'playwright-core';

export declare const CHROMIUM: string;
export declare const CHROMIUM_FLAGS: readonly string[];
export declare function openInBrowserPage(): Promise<{ page: Page; close(): Promise<void> }>;
