"""The safety text, in one place: a line under every account, the whole for help and the README."""

SAFETY = (
    "This computes and compares; it is no instruction to adjust a burner. Authorised and licensed persons only; local "
    "codes and the maker's instructions lead."
)
