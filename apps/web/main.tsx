import { createRoot } from 'react-dom/client';
import { App } from './app.js';
import { followPrinting } from './draw/on-paper.js';
import { takeReadersMark } from './readers-mark.js';
import { followTheme } from './theme.js';

takeReadersMark();
followTheme();
followPrinting();
createRoot(document.getElementById('page')!).render(<App />);
