"""The bundled rules, one module a family; they come in by the same door as anyone's."""
