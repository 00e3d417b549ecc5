// Runs before an install. npm alone would leave the workspace half linked, so it is sent to the set-up.
if (!/^pnpm\//.test(process.env.npm_config_user_agent ?? '')) {
  console.error('This workspace is installed with pnpm. Run: npm run setup');
  process.exit(1);
}
