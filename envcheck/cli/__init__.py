"""The command line: options in, exit status out. One small file per command."""

from __future__ import annotations

from importlib import import_module

import click

from envcheck import __version__

COMMANDS = {
    "check": ("envcheck.cli.check:check", "Hold a project against its limit tables."),
    "explain": ("envcheck.cli.explain:explain", "Show the worksheet of one element or assembly."),
    "remedy": ("envcheck.cli.remedy:remedy", "Say what would bring lines within their limits."),
    "compare": ("envcheck.cli.compare:compare", "Say what changed between two revisions."),
    "room": ("envcheck.cli.room:room", "Say how far a drawing may move within its limits."),
    "sure": ("envcheck.cli.sure:sure", "Say which inputs decide each verdict."),
    "new": ("envcheck.cli.new:new", "Write a commented project to start from."),
    "rules": ("envcheck.cli.rules:rules", "Type, lint, print back, compare and lock rule sets."),
    "schema": ("envcheck.cli.schema:schema", "Print the schema of a file format."),
    "materials": ("envcheck.cli.materials:materials", "Search the materials that come along."),
    "methods": ("envcheck.cli.methods:methods", "List the calculation methods with their sources."),
}
"""Command -> (where it lives, its one line of help), so that the help imports none of them."""
CONTEXT = {"help_option_names": ["-h", "--help"], "max_content_width": 100}


class LazyGroup(click.Group):
    """A group whose commands are imported only when they run."""

    table = COMMANDS

    def list_commands(self, ctx: click.Context) -> list[str]:
        """Give the names in the order of the table."""
        return list(self.table)

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        """Import one command; None for an unknown name."""
        if cmd_name not in self.table:
            return None
        module, _, name = self.table[cmd_name][0].partition(":")
        command: click.Command = getattr(import_module(module), name)
        return command

    def resolve_command(
        self, ctx: click.Context, args: list[str]
    ) -> tuple[str | None, click.Command | None, list[str]]:
        """Find the command; say which one was likely meant where there is none of that name."""
        if args and args[0] not in self.table and not args[0].startswith("-"):
            from envcheck.errors import did_you_mean, one_of, visible

            hint = did_you_mean(args[0], self.table) or one_of(self.table)
            ctx.fail(f"{visible(args[0])!r} is no command of {ctx.command_path}. Fix: {hint}")
        return super().resolve_command(ctx, args)

    def format_commands(self, ctx: click.Context, formatter: click.HelpFormatter) -> None:
        """Write the list of commands from the table alone."""
        with formatter.section("Commands"):
            formatter.write_dl([(name, line) for name, (_, line) in self.table.items()])


@click.group(cls=LazyGroup, context_settings=CONTEXT)
@click.version_option(__version__, message="envcheck %(version)s")
def envcheck() -> None:
    """Hold the U-factors of a drawn building envelope against the limit tables of a code.

    The report compares figures; it approves nothing. The code official decides.

    \b
    A worked line:
      envcheck check projects/quillhaven-library/permit.yaml

    \b
    Exit status: 0 nothing over its limit, nothing open; 1 something over its limit;
    3 nothing over, something open; 2 input or usage; 70 a fault of envcheck; 130 interrupted.
    """
