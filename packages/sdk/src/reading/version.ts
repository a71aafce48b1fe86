/** Version of the SDK, as its readings name it; held equal to the package's by a test. */
export const SDK_VERSION = '0.1.0';
