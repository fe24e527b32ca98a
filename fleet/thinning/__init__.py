"""Thinning: observations, histories, rates, planning rate, life and projection. Pure: arrays in, arrays out."""
