import { afterAll } from 'vitest';
import { removeTemporaryFolders } from './start-script';

afterAll(removeTemporaryFolders);
