import { createRoot } from 'react-dom/client';
import { App } from './app.js';
import { applyTheme } from './theme.js';

applyTheme();
createRoot(document.getElementById('page')!).render(<App />);
