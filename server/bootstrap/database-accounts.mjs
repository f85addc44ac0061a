/**
 * What the server does before it listens for the first time: closes what its installation leaves open, and makes the one
 * account of the service. One statement a line, as `--init-file` reads them; each start may run them again.
 * @param {string} password base64url, so it needs no escape
 * @param {string} [granted] pattern of further databases that the account may make and use
 * @returns {string}
 */
export function accountStatements(password, granted) {
  // With --skip-name-resolve TCP matches 127.0.0.1 alone, and the socket localhost alone.
  const accounts = ["'borewright'@'127.0.0.1'", "'borewright'@'localhost'"];
  return [
    "DELETE FROM mysql.global_priv WHERE User = '' OR (User = 'root' AND Host <> 'localhost');",
    "DELETE FROM mysql.proxies_priv WHERE User = '' OR Host <> 'localhost';",
    "FLUSH PRIVILEGES;",
    "ALTER USER 'root'@'localhost' IDENTIFIED VIA unix_socket;",
    "CREATE DATABASE IF NOT EXISTS borewright;",
    ...accounts.flatMap((account) => [
      `CREATE USER IF NOT EXISTS ${account};`,
      `ALTER USER ${account} IDENTIFIED BY '${password}';`,
      `GRANT ALL PRIVILEGES ON borewright.* TO ${account};`,
      ...(granted === undefined ? [] : [`GRANT ALL PRIVILEGES ON \`${granted}\`.* TO ${account};`]),
    ]),
    "",
  ].join("\n");
}
