/** Types of demo-instance.mjs for tests, which are TypeScript. */
export declare function startDemoInstance(where: {
  applicationUrl: string;
  ownerUrl: string;
  home: string;
}): Promise<{ base: string; stop: () => Promise<void> }>;
