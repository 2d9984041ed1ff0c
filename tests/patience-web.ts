/** The same for what Testing Library waits for on a page. */
import { configure } from '@testing-library/react';

configure({ asyncUtilTimeout: 15_000 });
