"""Garside normal forms: simple elements, words one by one and in batches, conjugacy."""

from braidsearch.normal_form.left_normal_form import NormalForm, are_equal, left_normal_form

__all__ = ["NormalForm", "are_equal", "left_normal_form"]
