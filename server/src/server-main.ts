import { createConnection, ProposedFeatures } from 'vscode-languageserver/node';
import { serve } from './server.ts';

// The transport (IPC from our own client, or --stdio) is read from the command line by the library.
serve(createConnection(ProposedFeatures.all));
