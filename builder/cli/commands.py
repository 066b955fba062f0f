"""The command `etchwright` and what it can be asked to do; each command is loaded when it is called."""

from __future__ import annotations

import difflib
import importlib

import click

_COMMANDS: dict[str, tuple[str, str]] = {
    "check": ("builder.cli.check_command", "check"),
    "site": ("builder.cli.site_command", "site"),
    "preview": ("builder.cli.site_command", "preview"),
    "plan": ("builder.cli.plan_command", "plan"),
    "remove": ("builder.cli.remove_command", "remove"),
    "spread": ("builder.cli.spread_command", "spread"),
    "figure": ("builder.cli.figure_command", "figure"),
    "new": ("builder.cli.new_command", "new"),
}

_FIRST_STEPS = """\b
First steps:
  etchwright new my-lab          start a lab of your own (or use the demonstration lab here)
  etchwright check               read and check every record
  etchwright plan SAMPLE.yaml    will my sample survive, and for how long do I etch?
  etchwright site                build the pages, then open site/index.html
"""


class _Lazy(click.Group):
    """Loads a command only when it is called: a plan must not wait for what draws pages."""

    def list_commands(self, ctx: click.Context) -> list[str]:
        return list(_COMMANDS)

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        if cmd_name not in _COMMANDS:
            return None
        module, name = _COMMANDS[cmd_name]
        command = getattr(importlib.import_module(module), name)
        assert isinstance(command, click.Command)
        return command

    def resolve_command(
        self, ctx: click.Context, args: list[str]
    ) -> tuple[str | None, click.Command | None, list[str]]:
        if args and not args[0].startswith("-") and args[0] not in _COMMANDS:
            close = difflib.get_close_matches(args[0], _COMMANDS, n=1)
            hint = f' Did you mean "{close[0]}"?' if close else " See etchwright --help."
            # Exit 2 is an answer of `plan`, so a mistyped command must end as bad input does.
            raise _BadInputError(f'There is no command "{args[0]}".{hint}')
        return super().resolve_command(ctx, args)


class _BadInputError(click.ClickException):
    """Bad input: exit 1."""

    exit_code = 1


@click.group(cls=_Lazy, epilog=_FIRST_STEPS, context_settings={"help_option_names": ["-h", "--help"]})
@click.version_option(package_name="etchwright", message="Etchwright %(version)s")
def group() -> None:
    """
    A lab's etch knowledge base: checked records in, computed pages and plans out.

    Commands act on the lab in this folder (its records stand in recipes/), or in the one named with
    --lab. Etchwright informs; it never authorises: the safety data sheet, local rules and licensed
    practice come first.
    """


def main() -> None:
    """Run the command line; bad input ends with exit 1, whatever found it."""
    try:
        # Without its own handling of ends, click returns the status that a command ended with.
        status = group.main(standalone_mode=False)
        raise SystemExit(status if isinstance(status, int) else 0)
    except click.Abort:
        click.echo("Stopped.", err=True)
        raise SystemExit(1) from None
    except click.ClickException as error:
        error.show()
        raise SystemExit(1) from None
