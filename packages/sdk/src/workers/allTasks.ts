/** Every task beyond `column`, registered by being imported. */
import './fitTasks.js';
