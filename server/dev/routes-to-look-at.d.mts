import type { Browser, BrowserContext, Page } from 'playwright-core';
import type { DemoStack } from './demo-stack.mjs';

export type Looker = 'operator' | 'programmer' | 'engineer' | 'lead' | null;
export type Size = 'phone' | 'wide';
export const lookers: readonly Looker[];
export const sizes: Readonly<Record<Size, { readonly width: number; readonly height: number }>>;
export const themes: readonly ('light' | 'night')[];
export function contextOf(browser: Browser, stack: DemoStack, who: Looker, size: Size): Promise<BrowserContext>;
export function routesOf(context: BrowserContext, who: Looker): Promise<readonly (readonly [string, string])[]>;
export function settled(page: Page): Promise<void>;
export function isOwnNote(text: string, from: string, page: string): boolean;
