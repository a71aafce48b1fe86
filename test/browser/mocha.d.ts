/** The part of the browser test framework that the tests here use. */
type MochaBody = (this: { timeout(milliseconds: number): void }) => void | Promise<void>;
declare function describe(title: string, body: () => void): void;
declare function it(title: string, body: MochaBody): void;
declare function before(body: MochaBody): void;
declare function after(body: MochaBody): void;
declare function beforeEach(body: MochaBody): void;
declare function afterEach(body: MochaBody): void;
