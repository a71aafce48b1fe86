/** Every task beyond `column`, registered by being imported. */
export {};
